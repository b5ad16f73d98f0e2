import { groupParams } from '#shared/schemas/invoice'
import { readGroupAccount } from '#server/services/groups/read-account'
import { defineApi } from '#server/utils/define-api'

/** A group's account. */
export default defineApi({ access: 'group:read', params: groupParams }, ({ db, actor, params, now }) => readGroupAccount(db, { groupId: params.groupId, actor, now }))
