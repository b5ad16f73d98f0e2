import { analysisParams } from '#shared/schemas/results'
import { getAnalysis } from '#server/services/results/get-analysis'
import { defineApi } from '#server/utils/define-api'

/** A saved analysis with its lineage, signatures and remarks. */
export default defineApi({ access: 'analysis:read', params: analysisParams }, ({ db, actor, params }) => getAnalysis(db, { analysisId: params.analysisId, actor }))
