import { and, eq, inArray, isNull } from 'drizzle-orm'
import type { Database } from '#server/db/client'
import { groupMemberships, groups, people } from '#server/db/schema'

/** Addresses a run's mail goes to. */
export interface RunRecipients { requester: string, pis: string[], invoices: string }

/**
 * Who is told of a run: the person who asked, the group's PIs, and where its invoices go.
 *
 * @param db database or transaction
 * @param run its group and who asked
 */
export async function findRunRecipients(db: Database, run: { groupId: string, requestedBy: string }): Promise<RunRecipients> {
  const pis = db.select({ id: groupMemberships.personId }).from(groupMemberships).where(and(eq(groupMemberships.groupId, run.groupId), eq(groupMemberships.role, 'pi')))
  const rows = await db.select({ id: people.id, email: people.email }).from(people).where(and(isNull(people.disabledAt), inArray(people.id, pis)))
  const [requester] = await db.select({ email: people.email }).from(people).where(eq(people.id, run.requestedBy))
  const [group] = await db.select({ invoiceEmail: groups.invoiceEmail }).from(groups).where(eq(groups.id, run.groupId))
  return { requester: requester!.email, pis: rows.map(row => row.email), invoices: group!.invoiceEmail }
}
