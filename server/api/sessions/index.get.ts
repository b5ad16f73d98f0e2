import { listOwnSessions } from '#server/services/people/end-session'
import { defineApi } from '#server/utils/define-api'

/** One's own open sessions. */
export default defineApi({ access: 'session:own' }, ({ db, actor, now }) => listOwnSessions(db, actor, now))
