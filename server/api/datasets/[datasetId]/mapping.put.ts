import { datasetParams, mapDatasetSchema } from '#shared/schemas/results'
import { mapDataset } from '#server/services/results/map-dataset'
import { defineApi } from '#server/utils/define-api'
import { useFileStore } from '#server/utils/files'

/** Confirms columns, units and sample facts, and which rejected rows are put back. */
export default defineApi({ access: 'dataset:upload', params: datasetParams, body: mapDatasetSchema }, ({ db, actor, params, body }) =>
  mapDataset(db, useFileStore(), { ...body, datasetId: params.datasetId, actor }))
