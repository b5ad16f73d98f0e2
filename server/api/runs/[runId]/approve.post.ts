import { runApproveSchema, runParams } from '#shared/schemas/run'
import { approveRun } from '#server/services/runs/approve-run'
import { defineApi } from '#server/utils/define-api'

/** Approves a request. */
export default defineApi({ access: 'run:approve', params: runParams, body: runApproveSchema }, async ({ db, actor, params, body, now }) => {
  const run = await approveRun(db, { runId: params.runId, actor, reason: body.reason, now })
  return { id: run.id, state: run.state, payBy: run.payBy }
})
