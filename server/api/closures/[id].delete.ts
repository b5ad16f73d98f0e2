import { closureParams } from '#shared/schemas/closure'
import { deleteClosure } from '#server/services/closures/delete-closure'
import { defineApi } from '#server/utils/define-api'

/** Opens a cryostat again. */
export default defineApi({ access: 'closure:write', on: 'facility', params: closureParams }, async ({ db, actor, params, now }) => {
  await deleteClosure(db, { closureId: params.id, actor, now })
  return { ok: true }
})
