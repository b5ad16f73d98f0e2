import { listRateCards } from '#server/services/rates/queries'
import { defineApi } from '#server/utils/define-api'

/** Issued rate cards. */
export default defineApi({ access: 'rates:read', on: 'facility' }, ({ db, now }) => listRateCards(db, now))
