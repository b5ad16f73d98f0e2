import { listPeople } from '#server/services/people/list-people'
import { defineApi } from '#server/utils/define-api'

/** Everyone who may sign in. */
export default defineApi({ access: 'people:read', on: 'facility' }, ({ db }) => listPeople(db))
