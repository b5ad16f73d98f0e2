import { and, eq, sql } from 'drizzle-orm'
import { formatSlot } from '#shared/utils/format-date'
import type { Database } from '#server/db/client'
import type { Span } from '#server/db/columns'
import { closures, cryostatHolds, cryostats, facilities, groups, runs } from '#server/db/schema'

/**
 * Says what holds a cryostat, so that a refusal names it.
 *
 * @param db database, not a transaction that was refused
 * @param wanted the cryostat and the span that was asked for
 * @returns one sentence naming the first run or closure in the way, or undefined when nothing is any more
 */
export async function describeHold(db: Database, { cryostatId, span }: { cryostatId: string, span: Span }): Promise<string | undefined> {
  const [hold] = await db.select({
    during: cryostatHolds.during,
    cryostatName: cryostats.name,
    runNumber: runs.number,
    runTitle: runs.title,
    groupName: groups.name,
    reason: closures.reason,
    timeZone: sql<string>`(select ${facilities.timeZone} from ${facilities} limit 1)`,
  }).from(cryostatHolds).innerJoin(cryostats, eq(cryostats.id, cryostatHolds.cryostatId))
    .leftJoin(runs, eq(runs.id, cryostatHolds.runId)).leftJoin(groups, eq(groups.id, runs.groupId)).leftJoin(closures, eq(closures.id, cryostatHolds.closureId))
    .where(and(eq(cryostatHolds.cryostatId, cryostatId), sql`${cryostatHolds.during} && tstzrange(${span.startsAt.toISOString()}::timestamptz, ${span.endsAt.toISOString()}::timestamptz)`))
    .orderBy(sql`lower(${cryostatHolds.during})`).limit(1)
  if (!hold) return undefined
  const when = formatSlot(hold.during.startsAt, hold.during.endsAt, hold.timeZone)
  return hold.runNumber === null
    ? `${hold.cryostatName} is closed ${when} (${hold.reason}).`
    : `${hold.cryostatName} is held by run ${String(hold.runNumber).padStart(4, '0')} (${hold.runTitle}, ${hold.groupName} group) ${when}.`
}
