import { sampleParams } from '#shared/schemas/sample'
import { readSample } from '#server/services/samples/queries'
import { defineApi } from '#server/utils/define-api'

/** One sample sheet. */
export default defineApi({ access: 'sample:read', params: sampleParams }, ({ db, actor, params }) => readSample(db, { sampleId: params.sampleId, actor }))
