import { findSessionPerson } from '#server/services/people/session-queries'
import { databaseReady } from '#server/utils/database'
import { readSessionSecret } from '#server/utils/session'

const WITHOUT_SESSION = /^\/(?:_nuxt\/|_fonts\/|mark\.svg|favicon\.ico|health|api\/payments\/webhook|api\/auth\/(?!session))/

/** Puts the signed-in person on the request, read afresh from the database. */
export default defineEventHandler(async (event) => {
  if (WITHOUT_SESSION.test(event.path)) return
  const secret = await readSessionSecret(event)
  if (!secret) return
  const { db } = await databaseReady()
  event.context.person = await findSessionPerson(db, { secret, now: new Date() }) ?? undefined
})
