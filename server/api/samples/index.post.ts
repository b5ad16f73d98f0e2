import { sampleSchema } from '#shared/schemas/sample'
import { saveSample } from '#server/services/samples/save-sample'
import { defineApi } from '#server/utils/define-api'

/** Writes a new sample sheet. */
export default defineApi({ access: 'sample:write', body: sampleSchema, status: 201 }, async ({ db, actor, body }) => ({ id: await saveSample(db, { sheet: body, actor }) }))
