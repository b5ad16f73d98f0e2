import { findSessionPerson } from '#server/services/people/session-queries'
import { databaseReady } from '#server/utils/database'
import type { SessionPerson } from '#shared/types/session'
import { readSessionSecret } from '#server/utils/session'

const WITHOUT_SESSION = /^\/(?:_nuxt\/|_fonts\/|mark\.svg|favicon\.ico|health|api\/payments\/webhook|api\/auth\/(?!session))/

/** Puts the signed-in person on the request, read afresh from the database. */
export default defineEventHandler(async (event) => {
  if (WITHOUT_SESSION.test(event.path)) return
  // A page's own request for data stays inside this process and carries the page's context: the person was just looked up.
  const page = (event.node.req as { __unenv__?: { person?: SessionPerson } }).__unenv__
  if (page?.person) {
    event.context.person = page.person
    return
  }
  const secret = await readSessionSecret(event)
  if (!secret) return
  const { db } = await databaseReady()
  event.context.person = await findSessionPerson(db, { secret, now: new Date() }) ?? undefined
})
