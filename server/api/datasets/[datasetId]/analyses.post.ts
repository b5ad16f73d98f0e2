import { datasetParams, saveAnalysisSchema } from '#shared/schemas/results'
import { saveAnalysis } from '#server/services/results/save-analysis'
import { defineApi } from '#server/utils/define-api'

/** Runs the engine on the server and keeps the analysis. */
export default defineApi({ access: 'analysis:write', params: datasetParams, body: saveAnalysisSchema, status: 201 }, ({ db, actor, params, body, now }) =>
  saveAnalysis(db, { ...body, datasetId: params.datasetId, actor, now }))
