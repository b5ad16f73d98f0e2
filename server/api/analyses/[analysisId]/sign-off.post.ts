import { analysisParams, signOffSchema } from '#shared/schemas/results'
import { signOff } from '#server/services/results/sign-off'
import { defineApi } from '#server/utils/define-api'

/** Signs the analysis, or says why not. */
export default defineApi({ access: 'analysis:sign', params: analysisParams, body: signOffSchema, status: 201 }, ({ db, actor, params, body, now }) =>
  signOff(db, { analysisId: params.analysisId, ...body, actor, now }))
