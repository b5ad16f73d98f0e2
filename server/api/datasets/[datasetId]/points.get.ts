import { datasetParams } from '#shared/schemas/results'
import { getPoints } from '#server/services/results/get-dataset'
import { defineApi } from '#server/utils/define-api'

/** The curve alone; null before the columns are confirmed. */
export default defineApi({ access: 'dataset:read', params: datasetParams }, ({ db, actor, params }) => getPoints(db, { datasetId: params.datasetId, actor }))
