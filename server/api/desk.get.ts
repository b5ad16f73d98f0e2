import { readDesk } from '#server/services/desk/read-desk'
import { defineApi } from '#server/utils/define-api'

/** The manager's first page. */
export default defineApi({ access: 'desk:read', on: 'facility' }, ({ db, now }) => readDesk(db, now))
