import { readHeliumBooks } from '#server/services/helium/read-books'
import { defineApi } from '#server/utils/define-api'

/** The books of helium. */
export default defineApi({ access: 'helium:read', on: 'facility' }, ({ db }) => readHeliumBooks(db))
