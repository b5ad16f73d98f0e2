import { listSamples } from '#server/services/samples/queries'
import { defineApi } from '#server/utils/define-api'

/** Samples the actor may see. */
export default defineApi({ access: 'sample:read' }, ({ db, actor }) => listSamples(db, actor))
