import { and, desc, eq, gt, isNull } from 'drizzle-orm'
import type { Actor } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import type { Database } from '#server/db/client'
import { sessions } from '#server/db/schema'
import { authorise } from '#server/services/access/authorise'
import { writeAudit } from '#server/services/audit/write-audit'

/** Sessions of the actor that are still open, the latest used first. */
export async function listOwnSessions(db: Database, actor: Actor, now: Date) {
  authorise(actor, 'session:own', { ownerId: actor.personId })
  const rows = await db.select().from(sessions).where(and(eq(sessions.personId, actor.personId), isNull(sessions.revokedAt), gt(sessions.expiresAt, now))).orderBy(desc(sessions.lastSeenAt))
  return rows.map(({ id, userAgent, createdAt, lastSeenAt }) => ({ id, userAgent, createdAt: createdAt.toISOString(), lastSeenAt: lastSeenAt.toISOString() }))
}

/**
 * Ends a session of one's own; its browser is signed out from its next request on.
 *
 * @param db database
 * @param input which session, who ends it, and the instant
 * @throws DomainError `not-found` for a session that is not there or not theirs
 */
export async function endSession(db: Database, input: { sessionId: string, actor: Actor, now: Date }): Promise<void> {
  const { sessionId, actor, now } = input
  const [session] = await db.select().from(sessions).where(eq(sessions.id, sessionId))
  authorise(actor, 'session:own', { ownerId: session?.personId })
  if (!session) throw new DomainError('not-found', 'There is no such session.')
  await db.update(sessions).set({ revokedAt: now }).where(eq(sessions.id, sessionId))
  await writeAudit(db, { actorId: actor.personId, action: 'session:end', objectType: 'session', objectId: sessionId })
}
