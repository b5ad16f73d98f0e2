import { sampleParams, sampleSchema } from '#shared/schemas/sample'
import { saveSample } from '#server/services/samples/save-sample'
import { defineApi } from '#server/utils/define-api'

/** Corrects a sample sheet. */
export default defineApi({ access: 'sample:write', params: sampleParams, body: sampleSchema }, async ({ db, actor, params, body }) => ({ id: await saveSample(db, { sheet: body, sampleId: params.sampleId, actor }) }))
