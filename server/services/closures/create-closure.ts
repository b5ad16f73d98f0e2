import { and, eq, sql } from 'drizzle-orm'
import type { Actor } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import type { ClosureInput } from '#shared/schemas/closure'
import type { Database } from '#server/db/client'
import { constraintOf } from '#server/db/constraint'
import { closures, cryostats, runs } from '#server/db/schema'
import { authorise } from '#server/services/access/authorise'
import { writeAudit } from '#server/services/audit/write-audit'
import { describeHold } from './find-hold'

/** A closure as made, and the requests that can no longer be approved. */
export interface CreatedClosure { id: string, askedRunNumbers: number[] }

/**
 * Closes a cryostat for a time. Asked runs on these days stay asked: the manager decides on each.
 *
 * @param db database
 * @param input cryostat, start, end, reason, who closes it, and the instant
 * @returns its id, and the numbers of asked runs on these days
 * @throws DomainError `conflict` naming the run or closure that holds these days, `invalid` for days that are over
 */
export async function createClosure(db: Database, { actor, now, ...closure }: ClosureInput & { actor: Actor, now: Date }): Promise<CreatedClosure> {
  const span = { startsAt: closure.startsAt, endsAt: closure.endsAt }
  try {
    return await db.transaction(async (tx) => {
      authorise(actor, 'closure:write')
      if (closure.endsAt <= now) throw new DomainError('invalid', 'These days are over. Choose days to come.', ['endsAt'])
      const [cryostat] = await tx.select({ id: cryostats.id }).from(cryostats).where(and(eq(cryostats.id, closure.cryostatId), sql`${cryostats.retiredAt} is null`))
      if (!cryostat) throw new DomainError('not-found', 'There is no such cryostat. Choose one from the board.', ['cryostatId'])
      const [row] = await tx.insert(closures).values({ cryostatId: cryostat.id, during: span, reason: closure.reason, createdBy: actor.personId }).returning({ id: closures.id })
      const asked = await tx.select({ number: runs.number }).from(runs)
        .where(and(eq(runs.cryostatId, cryostat.id), eq(runs.state, 'asked'), sql`${runs.slot} && tstzrange(${span.startsAt.toISOString()}::timestamptz, ${span.endsAt.toISOString()}::timestamptz)`))
        .orderBy(runs.number)
      await writeAudit(tx, { actorId: actor.personId, action: 'closure:write', objectType: 'closure', objectId: row!.id, detail: { cryostatId: cryostat.id, startsAt: span.startsAt.toISOString(), endsAt: span.endsAt.toISOString(), reason: closure.reason } })
      return { id: row!.id, askedRunNumbers: asked.map(({ number }) => number) }
    })
  }
  catch (error) {
    if (constraintOf(error) !== 'cryostat_holds_no_overlap') throw error
    const hold = await describeHold(db, { cryostatId: closure.cryostatId, span }) ?? 'Somebody else was quicker on these days.'
    throw new DomainError('conflict', `${hold} Choose other days, or move that first.`, ['startsAt'])
  }
}
