import { runParams } from '#shared/schemas/run'
import { readSheet } from '#server/services/run-log/read-sheet'
import { defineApi } from '#server/utils/define-api'

/** The run sheet with what it comes to. */
export default defineApi({ access: 'run:read', params: runParams }, ({ db, actor, params, now }) => readSheet(db, { runId: params.runId, actor, now }))
