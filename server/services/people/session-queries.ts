import { and, eq, isNull, sql } from 'drizzle-orm'
import type { Database } from '#server/db/client'
import type { SessionPerson } from '#shared/types/session'
import { groupMemberships, groups, people, sessions } from '#server/db/schema'
import { hashSessionSecret } from './sign-in'

/** Idle limits: shorter with manager rights, since those can spend other people's money. */
const IDLE_S = { manager: 3600, other: 12 * 3600 }
const TOUCH_EVERY_S = 300

/**
 * Looks a session up on every request, so that a revoked one, a disabled person or a changed right counts at once.
 *
 * @param db database
 * @param input the secret of the cookie, and the instant
 * @returns the person, or null when the session is unknown, revoked, expired or idle for too long
 */
export async function findSessionPerson(db: Database, input: { secret: string, now: Date }): Promise<SessionPerson | null> {
  const [row] = await db.select({
    sessionId: sessions.id,
    lastSeenAt: sessions.lastSeenAt,
    expiresAt: sessions.expiresAt,
    personId: people.id,
    name: people.name,
    email: people.email,
    timeZone: people.timeZone,
    isManager: people.isManager,
    isOperator: people.isOperator,
    groups: sql<SessionPerson['groups']>`coalesce((
      select json_agg(json_build_object('id', ${groups.id}, 'name', ${groups.name}, 'class', ${groups.class}, 'role', ${groupMemberships.role}) order by ${groups.name})
      from ${groupMemberships} join ${groups} on ${groups.id} = ${groupMemberships.groupId} where ${groupMemberships.personId} = ${people.id}), '[]')`,
  }).from(sessions).innerJoin(people, eq(people.id, sessions.personId))
    .where(and(eq(sessions.secretHash, hashSessionSecret(input.secret)), isNull(sessions.revokedAt), isNull(people.disabledAt)))
  if (!row) return null
  const idleS = (input.now.getTime() - row.lastSeenAt.getTime()) / 1000
  if (row.expiresAt <= input.now || idleS > (row.isManager ? IDLE_S.manager : IDLE_S.other)) return null
  if (idleS > TOUCH_EVERY_S) await db.update(sessions).set({ lastSeenAt: input.now }).where(eq(sessions.id, row.sessionId))
  const { sessionId: _, lastSeenAt: __, expiresAt: ___, ...person } = row
  return person
}
