import { runFinishSchema, runParams } from '#shared/schemas/run'
import { finishRun } from '#server/services/runs/finish-run'
import { defineApi } from '#server/utils/define-api'

/** Finishes a running run; charging follows by itself. */
export default defineApi({ access: 'run:finish', params: runParams, body: runFinishSchema }, async ({ db, actor, params, body, now }) => {
  const run = await finishRun(db, { runId: params.runId, actor, finish: body, now })
  return { id: run.id, state: run.state }
})
