import { datasetRoleSchema, runDatasetParams } from '#shared/schemas/results'
import { uploadDataset } from '#server/services/results/upload-dataset'
import { defineApi } from '#server/utils/define-api'
import { useFileStore } from '#server/utils/files'
import { readUpload } from '#server/utils/multipart'

/** Takes in a measured table as it came. */
export default defineApi({ access: 'dataset:upload', params: runDatasetParams, status: 201 }, async ({ event, db, actor, params, now }) => {
  const { files, fields } = await readUpload(event)
  const role = datasetRoleSchema.parse(fields.role ?? 'measurement', { path: ['role'] })
  return uploadDataset(db, useFileStore(), { runId: params.runId, role, file: files.file ?? null, actor, now })
})
