import { closureSchema } from '#shared/schemas/closure'
import { createClosure } from '#server/services/closures/create-closure'
import { defineApi } from '#server/utils/define-api'

/** Closes a cryostat for a time. */
export default defineApi({ access: 'closure:write', on: 'facility', body: closureSchema, status: 201 }, ({ db, actor, body, now }) => createClosure(db, { ...body, actor, now }))
