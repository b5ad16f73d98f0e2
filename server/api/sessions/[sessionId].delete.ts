import { sessionParams } from '#shared/schemas/sign-in'
import { endSession } from '#server/services/people/end-session'
import { defineApi } from '#server/utils/define-api'

/** Ends one of one's own sessions. */
export default defineApi({ access: 'session:own', params: sessionParams }, async ({ db, actor, params, now }) => {
  await endSession(db, { sessionId: params.sessionId, actor, now })
  return { ended: true }
})
