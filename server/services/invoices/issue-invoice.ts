import { and, eq, sql } from 'drizzle-orm'
import { DomainError } from '#shared/errors'
import { besideEstimate, invoiceAmounts } from '#shared/pricing/invoice'
import { priceLines } from '#shared/pricing/lines'
import { addDays, wallTimeOf } from '#shared/time/facility-time'
import type { Database } from '#server/db/client'
import { cryostats, groups, invoiceLines, invoices, payments, rateCardPrices, runEntries, runs, runSamples } from '#server/db/schema'
import { writeAudit } from '#server/services/audit/write-audit'
import { type Facility, readFacility } from '#server/services/facility/queries'
import { readReturnedMg } from '#server/services/run-log/read-sheet'
import { actualQuantities } from './actual-quantities'

/** An issued invoice's row. */
export type Invoice = typeof invoices.$inferSelect

/**
 * Issues the invoice of a finished run from what was logged, with the estimate beside it. Called again, it returns the
 * invoice that stands. The database gives the number, in the same transaction, without gaps.
 *
 * @param tx transaction that holds the run's lock
 * @param input the run and the instant
 */
export async function issueInvoice(tx: Database, input: { runId: string, now: Date }): Promise<Invoice> {
  const { runId, now } = input
  const [standing] = await tx.select().from(invoices).where(and(eq(invoices.runId, runId), eq(invoices.kind, 'invoice')))
  if (standing) return standing
  const [row] = await tx.select({ run: runs, cryostat: cryostats, group: groups, prices: rateCardPrices }).from(runs)
    .innerJoin(cryostats, eq(cryostats.id, runs.cryostatId)).innerJoin(groups, eq(groups.id, runs.groupId))
    .innerJoin(rateCardPrices, and(eq(rateCardPrices.rateCardId, runs.rateCardId), eq(rateCardPrices.groupClass, groups.class))).where(eq(runs.id, runId))
  if (!row?.run.finishedAt) throw new DomainError('conflict', 'Only a finished run can be invoiced.')
  const { run, cryostat, group, prices } = row
  const finishedAt = row.run.finishedAt
  const facility = await readFacility(tx)
  const entries = await tx.select().from(runEntries).where(eq(runEntries.runId, runId)).orderBy(runEntries.at, runEntries.id)
  const [{ sampleCount } = { sampleCount: 0 }] = await tx.select({ sampleCount: sql<number>`count(*)::int` }).from(runSamples).where(eq(runSamples.runId, runId))
  const quantities = actualQuantities({ run, entries, cryostat, returnedMg: await readReturnedMg(tx, runId), sampleCount, until: finishedAt })
  const lines = besideEstimate(priceLines(quantities, prices), run.quote.lines)
  const amounts = invoiceAmounts(lines, run.quote, await readPrepaidMinor(tx, runId))

  const issuedOn = wallTimeOf(now, facility.timeZone).date
  const [invoice] = await tx.insert(invoices).values({
    kind: 'invoice', year: 0, sequence: 0, number: '', runId, groupId: group.id, issuedAt: now, issuedOn, suppliedOn: wallTimeOf(finishedAt, facility.timeZone).date,
    dueOn: amounts.dueMinor > 0 ? addDays(issuedOn, facility.paymentTermDays) : null,
    seller: { name: facility.name, addressLines: facility.addressLines, email: facility.email, vatId: facility.vatId },
    buyer: { name: `${group.institution}, ${group.name} group`, addressLines: group.addressLines, email: group.invoiceEmail, vatId: group.vatId },
    reference: run.costCode ?? run.purchaseOrder ?? '', currency: facility.currency, vatBasisPoints: run.quote.vatBasisPoints, reverseCharge: run.quote.reverseCharge,
    ...amounts, paymentText: paymentText(facility, group, amounts.dueMinor, run.costCode),
  }).returning()
  await tx.insert(invoiceLines).values(lines.map(({ kind, label, unit, quantity, unitPriceMinor, netMinor, estimatedQuantity, estimatedNetMinor }, index) => ({
    invoiceId: invoice!.id, position: index + 1, kind, label, unit, quantity, unitPriceMinor, netMinor, estimatedQuantity, estimatedNetMinor,
  })))
  await writeAudit(tx, { actorId: null, action: 'invoice:issue', objectType: 'invoice', objectId: invoice!.id, detail: { number: invoice!.number, totalMinor: invoice!.totalMinor } })
  return invoice!
}

async function readPrepaidMinor(tx: Database, runId: string): Promise<number> {
  const [row] = await tx.select({ prepaid: sql<number>`coalesce(sum(${payments.amountMinor}), 0)::float8` }).from(payments)
    .where(and(eq(payments.runId, runId), eq(payments.kind, 'deposit'), eq(payments.state, 'succeeded')))
  return row?.prepaid ?? 0
}

function paymentText(facility: Facility, group: typeof groups.$inferSelect, dueMinor: number, costCode: string | null): string {
  if (group.class === 'internal') return `Charged to cost code ${costCode ?? 'of the group'}; nothing is to be paid.`
  if (dueMinor < 0) return 'More was paid before than is due; the difference goes back to the card that paid the deposit.'
  if (dueMinor === 0) return 'Paid in full; nothing is to be paid.'
  return `The balance is charged to the card that paid the deposit. Should the card refuse, pay to ${facility.bankAccount} within ${facility.paymentTermDays} days, naming the invoice number.`
}
