import { runDeclineSchema, runParams } from '#shared/schemas/run'
import { declineRun } from '#server/services/runs/decline-run'
import { defineApi } from '#server/utils/define-api'

/** Declines a request with a reason. */
export default defineApi({ access: 'run:decline', params: runParams, body: runDeclineSchema }, async ({ db, actor, params, body, now }) => {
  const run = await declineRun(db, { runId: params.runId, actor, reason: body.reason, now })
  return { id: run.id, state: run.state }
})
