import { cryostatParams } from '#shared/schemas/cryostat'
import { readCryostat } from '#server/services/cryostats/read-cryostat'
import { defineApi } from '#server/utils/define-api'

/** A cryostat's facts and what its past taught. */
export default defineApi({ access: 'cryostat:read', on: 'facility', params: cryostatParams }, ({ db, actor, params }) => readCryostat(db, params.slug, actor))
