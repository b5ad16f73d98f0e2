import { and, desc, eq, inArray } from 'drizzle-orm'
import type { Actor } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import type { InvoiceDetail, InvoiceListItem } from '#shared/types/invoices'
import type { Database } from '#server/db/client'
import { groups, invoiceDocuments, invoiceLines, invoices, payments, runs } from '#server/db/schema'
import { authorise } from '#server/services/access/authorise'

const columns = {
  id: invoices.id, number: invoices.number, kind: invoices.kind, issuedOn: invoices.issuedOn, group: groups.name, runId: invoices.runId, runNumber: runs.number, runTitle: runs.title,
  totalMinor: invoices.totalMinor, dueMinor: invoices.dueMinor, currency: invoices.currency, runState: runs.state,
}

function toItem({ runState, ...row }: Omit<InvoiceListItem, 'isSettled'> & { runState: string }): InvoiceListItem {
  return { ...row, isSettled: runState === 'settled' }
}

/**
 * Invoices an actor may see, newest first: all for the manager, those of the groups they lead for PIs.
 *
 * @param db database
 * @param input who asks, and a group to narrow to
 */
export async function listInvoices(db: Database, input: { actor: Actor, groupId?: string }): Promise<InvoiceListItem[]> {
  const { actor, groupId } = input
  const led = actor.memberships.filter(({ role }) => role === 'pi').map(membership => membership.groupId)
  authorise(actor, 'invoice:read', { groupId: groupId ?? led[0] })
  const rows = await db.select(columns).from(invoices).innerJoin(groups, eq(groups.id, invoices.groupId)).innerJoin(runs, eq(runs.id, invoices.runId))
    .where(and(actor.isManager ? undefined : inArray(invoices.groupId, led), groupId ? eq(invoices.groupId, groupId) : undefined))
    .orderBy(desc(invoices.year), desc(invoices.sequence)).limit(1000)
  return rows.map(toItem)
}

/**
 * An invoice as its page shows it.
 *
 * @throws DomainError `not-found` for one that is not there or not theirs
 */
export async function readInvoice(db: Database, input: { invoiceId: string, actor: Actor }): Promise<InvoiceDetail> {
  const [row] = await db.select({ invoice: invoices, item: columns, pdfSha256: invoiceDocuments.sha256 }).from(invoices)
    .innerJoin(groups, eq(groups.id, invoices.groupId)).innerJoin(runs, eq(runs.id, invoices.runId)).leftJoin(invoiceDocuments, eq(invoiceDocuments.invoiceId, invoices.id))
    .where(eq(invoices.id, input.invoiceId))
  authorise(input.actor, 'invoice:read', row ? { groupId: row.invoice.groupId } : {})
  if (!row) throw new DomainError('not-found', 'There is no such invoice. Look for it under Invoices.')
  const { dueOn, suppliedOn, seller, buyer, reference, vatBasisPoints, reverseCharge, netMinor, vatMinor, prepaidMinor, paymentText } = row.invoice
  const lines = await db.select().from(invoiceLines).where(eq(invoiceLines.invoiceId, input.invoiceId)).orderBy(invoiceLines.position)
  const moved = await db.select().from(payments).where(eq(payments.runId, row.invoice.runId)).orderBy(payments.createdAt)
  return {
    ...toItem(row.item), dueOn, suppliedOn, seller, buyer, reference, vatBasisPoints, reverseCharge, netMinor, vatMinor, prepaidMinor, paymentText, pdfSha256: row.pdfSha256,
    lines: lines.map(({ position, label, unit, quantity, estimatedQuantity, unitPriceMinor, netMinor: net, estimatedNetMinor }) => ({ position, label, unit, quantity, estimatedQuantity, unitPriceMinor, netMinor: net, estimatedNetMinor })),
    payments: moved.map(({ kind, state, amountMinor, settledAt, createdAt, failure, actionUrl }) => ({ kind, state, amountMinor, at: (settledAt ?? createdAt).toISOString(), failure, actionUrl })),
  }
}

/** The stored PDF of an invoice: its number and file, or null until it is rendered. */
export async function findInvoiceDocument(db: Database, input: { invoiceId: string, actor: Actor }): Promise<{ number: string, fileKey: string } | null> {
  const [row] = await db.select({ groupId: invoices.groupId, number: invoices.number, fileKey: invoiceDocuments.fileKey }).from(invoices)
    .leftJoin(invoiceDocuments, eq(invoiceDocuments.invoiceId, invoices.id)).where(eq(invoices.id, input.invoiceId))
  authorise(input.actor, 'invoice:read', row ? { groupId: row.groupId } : {})
  if (!row) throw new DomainError('not-found', 'There is no such invoice. Look for it under Invoices.')
  return row.fileKey === null ? null : { number: row.number, fileKey: row.fileKey }
}
