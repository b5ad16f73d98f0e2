import { and, eq, inArray, notExists, sql } from 'drizzle-orm'
import type { Actor } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import { HOLDING_STATES } from '#shared/runs/states'
import { wallTimeOf } from '#shared/time/facility-time'
import type { GroupAccount } from '#shared/types/invoices'
import type { Database } from '#server/db/client'
import { groupMemberships, groups, invoices, people, runs } from '#server/db/schema'
import { authorise } from '#server/services/access/authorise'
import { readFacility } from '#server/services/facility/queries'
import { listInvoices } from '#server/services/invoices/queries'

/**
 * A group's account: cap, what is committed and invoiced this year, invoices, members.
 *
 * @param db database
 * @param input which group, who asks, and the instant
 * @throws DomainError `not-found` for a group that is not there or not theirs to see
 */
export async function readGroupAccount(db: Database, input: { groupId: string, actor: Actor, now: Date }): Promise<GroupAccount> {
  const { groupId, actor, now } = input
  authorise(actor, 'group:read', { groupId })
  const [group] = await db.select().from(groups).where(eq(groups.id, groupId))
  if (!group) throw new DomainError('not-found', 'There is no such group.')
  const facility = await readFacility(db)
  const year = Number(wallTimeOf(now, facility.timeZone).date.slice(0, 4))
  const open = await db.select({ quote: runs.quote, slot: runs.slot }).from(runs).where(and(
    eq(runs.groupId, groupId), inArray(runs.state, [...HOLDING_STATES, 'finished']), notExists(db.select({ one: sql`1` }).from(invoices).where(eq(invoices.runId, runs.id))),
  ))
  const items = await listInvoices(db, { actor, groupId })
  const members = await db.select({ name: people.name, email: people.email, role: groupMemberships.role }).from(groupMemberships).innerJoin(people, eq(people.id, groupMemberships.personId)).where(eq(groupMemberships.groupId, groupId)).orderBy(people.name)
  return {
    id: group.id, name: group.name, class: group.class, institution: group.institution, currency: facility.currency, timeZone: facility.timeZone, year, capMinor: group.capMinor, costCodes: group.costCodes,
    committedMinor: open.filter(run => run.slot.startsAt.getUTCFullYear() === year).reduce((sum, run) => sum + run.quote.totalMinor.likely, 0),
    invoicedMinor: items.filter(item => item.issuedOn.startsWith(String(year))).reduce((sum, item) => sum + (item.kind === 'invoice' ? item.totalMinor : -item.totalMinor), 0),
    members, invoices: items,
  }
}
