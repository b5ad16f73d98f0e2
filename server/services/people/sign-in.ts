import { createHash, randomBytes } from 'node:crypto'
import { eq, sql } from 'drizzle-orm'
import { DomainError } from '#shared/errors'
import type { Database } from '#server/db/client'
import { people, sessions } from '#server/db/schema'
import { writeAudit } from '#server/services/audit/write-audit'
import { hashPassword, verifyPassword } from './password'

/** Absolute lifetime of a session: a day with manager rights, thirty days without. */
const LIFETIME_S = { manager: 24 * 3600, other: 30 * 24 * 3600 }
const FREE_TRIES = 5
const LONGEST_WAIT_S = 15 * 60

/** A new session: the secret goes into the browser's cookie, only its hash is stored. */
export interface NewSession { secret: string, personId: string, name: string, email: string }

// Verified against when the address is unknown, so that both answers take the same time.
let decoyHash: Promise<string> | undefined

/**
 * Signs a person in by e-mail and password and opens a session.
 *
 * @param db database
 * @param input what was typed, the browser's name, and the instant
 * @returns the session's secret, or null when address and password do not match an enabled account
 * @throws DomainError `too-many` after five failures, until a growing wait is over
 */
export async function signIn(db: Database, input: { email: string, password: string, userAgent: string, now: Date }): Promise<NewSession | null> {
  const { email, password, userAgent, now } = input
  const [person] = await db.select().from(people).where(eq(sql`lower(${people.email})`, email.trim().toLowerCase()))
  if (person?.retryAfter && person.retryAfter > now) {
    const minutes = Math.ceil((person.retryAfter.getTime() - now.getTime()) / 60_000)
    throw new DomainError('too-many', `Too many failed tries for this address. Try again in ${minutes} min.`, ['password'])
  }
  decoyHash ??= hashPassword(randomBytes(16).toString('hex'))
  const matches = await verifyPassword(person?.passwordHash ?? await decoyHash, password)
  if (!person || person.disabledAt || !matches) {
    if (person) await countFailure(db, person.id, now)
    return null
  }
  const secret = randomBytes(32).toString('base64url')
  const lifetimeS = person.isManager ? LIFETIME_S.manager : LIFETIME_S.other
  await db.transaction(async (tx) => {
    await tx.update(people).set({ failedSignIns: 0, retryAfter: null }).where(eq(people.id, person.id))
    await tx.insert(sessions).values({
      secretHash: hashSessionSecret(secret),
      personId: person.id,
      userAgent: userAgent.slice(0, 300),
      createdAt: now,
      lastSeenAt: now,
      expiresAt: new Date(now.getTime() + lifetimeS * 1000),
    })
    await writeAudit(tx, { actorId: person.id, action: 'session:open', objectType: 'person', objectId: person.id })
  })
  return { secret, personId: person.id, name: person.name, email: person.email }
}

/**
 * Ends a session; its cookie is refused from the next request on.
 *
 * @param db database
 * @param input the secret of the cookie, and the instant
 */
export async function signOut(db: Database, input: { secret: string, now: Date }): Promise<void> {
  await db.update(sessions).set({ revokedAt: input.now }).where(eq(sessions.secretHash, hashSessionSecret(input.secret)))
}

/** SHA-256 of a session secret: 256 random bits need no slow hash. */
export function hashSessionSecret(secret: string): string {
  return createHash('sha256').update(secret).digest('hex')
}

async function countFailure(db: Database, personId: string, now: Date) {
  const [row] = await db.update(people).set({ failedSignIns: sql`${people.failedSignIns} + 1` })
    .where(eq(people.id, personId)).returning({ failures: people.failedSignIns })
  const failures = row?.failures ?? 0
  if (failures >= FREE_TRIES) {
    const waitS = Math.min(LONGEST_WAIT_S, 30 * 2 ** (failures - FREE_TRIES))
    await db.update(people).set({ retryAfter: new Date(now.getTime() + waitS * 1000) }).where(eq(people.id, personId))
  }
  await writeAudit(db, { actorId: null, action: 'session:refuse', objectType: 'person', objectId: personId, detail: { failures } })
}
