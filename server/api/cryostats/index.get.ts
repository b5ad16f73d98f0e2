import { readPlanOptions } from '#server/services/cryostats/queries'
import { defineApi } from '#server/utils/define-api'

/** The cryostats in use, with their limits. */
export default defineApi({ access: 'cryostat:read', on: 'facility' }, ({ db }) => readPlanOptions(db))
