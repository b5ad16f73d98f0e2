import { runListQuery } from '#shared/schemas/run'
import { listRuns } from '#server/services/runs/queries'
import { defineApi } from '#server/utils/define-api'

/** A page of runs that the actor may see. */
export default defineApi({ access: 'run:read', query: runListQuery }, ({ db, actor, query }) => listRuns(db, { actor, ...query }))
