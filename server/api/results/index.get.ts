import { resultListQuery } from '#shared/schemas/results'
import { listResults } from '#server/services/results/list-results'
import { defineApi } from '#server/utils/define-api'

/** Datasets with the verdict of their newest analysis. */
export default defineApi({ access: 'dataset:read', query: resultListQuery }, ({ db, actor, query }) => listResults(db, { ...query, actor }))
