import { readToday } from '#server/services/today/read-today'
import { defineApi } from '#server/utils/define-api'

/** The operator's first page. */
export default defineApi({ access: 'today:read', on: 'facility' }, ({ db, now }) => readToday(db, now))
