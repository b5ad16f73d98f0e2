import { datasetParams } from '#shared/schemas/results'
import { previewTable } from '#server/services/results/preview-table'
import { defineApi } from '#server/utils/define-api'
import { useFileStore } from '#server/utils/files'

/** Heads and first rows of the table, for choosing its columns. */
export default defineApi({ access: 'dataset:read', params: datasetParams }, ({ db, actor, params }) =>
  previewTable(db, useFileStore(), { datasetId: params.datasetId, actor }))
