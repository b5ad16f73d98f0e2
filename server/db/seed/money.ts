import { and, eq } from 'drizzle-orm'
import type { FileStore } from '#server/adapters/storage/files'
import type { PdfFonts } from '#server/adapters/pdf/page'
import type { Database } from '#server/db/client'
import type { invoices } from '#server/db/schema'
import { payments, runs, runTransitions } from '#server/db/schema'
import { issueInvoice } from '#server/services/invoices/issue-invoice'
import { keepInvoicePaper } from '#server/services/invoices/render-invoice'
import type { SeededRun } from './runs'

const HOUR_MS = 3_600_000
/** The newest finished runs wait for their balance. */
const UNSETTLED_FOR_MS = 20 * HOUR_MS

/** Deposits of runs that were confirmed, as the payment provider would have taken them. */
export async function seedDeposits(db: Database, seeded: SeededRun[]) {
  const rows = seeded.filter(({ run, group }) => group.class !== 'internal' && ['confirmed', 'running', 'finished', 'settled'].includes(run.state)).map(({ run }) => ({
    runId: run.id, kind: 'deposit' as const, attempt: 1, state: 'succeeded' as const, amountMinor: run.quote.depositMinor, currency: 'EUR', idempotencyKey: `deposit:${run.id}:1`,
    intentId: `pi_seed_${run.number}`, createdAt: run.createdAt, settledAt: new Date(run.createdAt.getTime() + 20 * HOUR_MS),
  }))
  if (rows.length > 0) await db.insert(payments).values(rows)
}

/** Invoices of finished runs in order of their dates, their papers, and how each was settled. */
export async function seedInvoices(db: Database, seeded: SeededRun[], tools: { files: FileStore, fonts: PdfFonts }, now: Date) {
  const finished = seeded.filter(({ run }) => run.finishedAt !== null).sort((a, b) => a.run.finishedAt!.getTime() - b.run.finishedAt!.getTime())
  for (const { run, group } of finished) {
    const issuedAt = new Date(run.finishedAt!.getTime() + HOUR_MS)
    if (issuedAt > now) continue
    const invoice = await db.transaction(tx => issueInvoice(tx, { runId: run.id, now: issuedAt }))
    await keepInvoicePaper(db, tools, invoice.id)
    if (now.getTime() - issuedAt.getTime() < UNSETTLED_FOR_MS) continue
    await settle(db, run, invoice, group.class, new Date(issuedAt.getTime() + HOUR_MS / 2))
  }
}

async function settle(db: Database, run: SeededRun['run'], invoice: typeof invoices.$inferSelect, groupClass: string, at: Date) {
  if (groupClass !== 'internal' && invoice.dueMinor !== 0) {
    const isRefund = invoice.dueMinor < 0
    await db.insert(payments).values({
      runId: run.id, kind: isRefund ? 'refund' : 'balance', attempt: 1, state: 'succeeded', amountMinor: Math.abs(invoice.dueMinor), currency: invoice.currency, idempotencyKey: `${isRefund ? 'refund' : 'balance'}:${invoice.id}:1`,
      intentId: `pi_seed_${run.number}_${isRefund ? 'r' : 'b'}`, createdAt: at, settledAt: at,
    })
  }
  await db.update(runs).set({ state: 'settled' }).where(and(eq(runs.id, run.id), eq(runs.state, 'finished')))
  await db.insert(runTransitions).values({ runId: run.id, fromState: 'finished', toState: 'settled', actorId: null, reason: groupClass === 'internal' ? 'Charged to the cost code.' : 'The balance was settled.', at })
}
