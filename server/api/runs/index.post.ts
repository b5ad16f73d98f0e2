import { runAskSchema } from '#shared/schemas/run'
import { askForRun } from '#server/services/runs/ask-for-run'
import { defineApi } from '#server/utils/define-api'

/** Asks for days. */
export default defineApi({ access: 'run:ask', body: runAskSchema, status: 201 }, async ({ db, actor, body, now }) => {
  const run = await askForRun(db, { ask: body, actor, now })
  return { id: run.id, number: run.number, state: run.state }
})
