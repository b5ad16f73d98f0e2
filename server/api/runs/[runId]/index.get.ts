import { runParams } from '#shared/schemas/run'
import { readRun } from '#server/services/runs/queries'
import { defineApi } from '#server/utils/define-api'

/** A run with everything its page shows. */
export default defineApi({ access: 'run:read', params: runParams }, ({ db, actor, params }) => readRun(db, { runId: params.runId, actor }))
