import { runParams, runStartSchema } from '#shared/schemas/run'
import { startRun } from '#server/services/runs/start-run'
import { defineApi } from '#server/utils/define-api'

/** Starts a confirmed run. */
export default defineApi({ access: 'run:advance', params: runParams, body: runStartSchema }, async ({ db, actor, params, now }) => {
  const run = await startRun(db, { runId: params.runId, actor, now })
  return { id: run.id, state: run.state }
})
