import { runParams, runWithdrawSchema } from '#shared/schemas/run'
import { withdrawRun } from '#server/services/runs/withdraw-run'
import { defineApi } from '#server/utils/define-api'

/** Withdraws a run before it starts. */
export default defineApi({ access: 'run:withdraw', params: runParams, body: runWithdrawSchema }, async ({ db, actor, params, body, now }) => {
  const run = await withdrawRun(db, { runId: params.runId, actor, reason: body.reason, now })
  return { id: run.id, state: run.state }
})
