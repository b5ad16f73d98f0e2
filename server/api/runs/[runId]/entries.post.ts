import { runParams } from '#shared/schemas/run'
import { runEntrySchema } from '#shared/schemas/run-log'
import { recordEntry } from '#server/services/run-log/record-entry'
import { defineApi } from '#server/utils/define-api'

/** Records one line of the run sheet. */
export default defineApi({ access: 'run:log', params: runParams, body: runEntrySchema }, async ({ db, actor, params, body, now }) => {
  const { entry, remark, isRepeat } = await recordEntry(db, { runId: params.runId, actor, entry: body, now })
  return { id: entry.id, remark, isRepeat, outsideUsual: entry.outsideUsual }
})
