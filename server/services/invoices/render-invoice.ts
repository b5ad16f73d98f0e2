import { eq } from 'drizzle-orm'
import { type PdfFonts, renderInvoicePdf } from '#server/adapters/pdf/invoice'
import type { FileStore } from '#server/adapters/storage/files'
import type { Database } from '#server/db/client'
import { cryostats, invoiceDocuments, invoiceLines, invoices, runs } from '#server/db/schema'
import { queueRunMail } from '#server/services/mail/queue-run-mail'
import { readFacility } from '#server/services/facility/queries'

/** What rendering needs beside the database. */
export interface PaperTools { files: FileStore, fonts: PdfFonts }

type Kept = { invoice: typeof invoices.$inferSelect, run: typeof runs.$inferSelect }

/**
 * Renders an issued invoice once and keeps the file with its hash. The same invoice always gives the same bytes.
 *
 * @param db database
 * @param tools the file store and the fonts
 * @param invoiceId which invoice
 * @param whenKept done in the transaction that keeps it, and only then
 */
export async function keepInvoicePaper(db: Database, tools: PaperTools, invoiceId: string, whenKept?: (tx: Database, kept: Kept) => Promise<void>): Promise<void> {
  const [standing] = await db.select().from(invoiceDocuments).where(eq(invoiceDocuments.invoiceId, invoiceId))
  if (standing) return
  const [row] = await db.select({ invoice: invoices, run: runs, cryostat: cryostats.name }).from(invoices).innerJoin(runs, eq(runs.id, invoices.runId)).innerJoin(cryostats, eq(cryostats.id, runs.cryostatId)).where(eq(invoices.id, invoiceId))
  if (!row) return
  const lines = await db.select().from(invoiceLines).where(eq(invoiceLines.invoiceId, invoiceId)).orderBy(invoiceLines.position)
  const { timeZone } = await readFacility(db)
  const corrects = row.invoice.correctsInvoiceId ? await findCorrected(db, row.invoice.correctsInvoiceId) : null
  const file = await tools.files.putFile(await renderInvoicePdf({ invoice: row.invoice, lines, run: row.run, cryostat: row.cryostat, timeZone, corrects }, tools.fonts))
  await db.transaction(async (tx) => {
    const [written] = await tx.insert(invoiceDocuments).values({ invoiceId, fileKey: file.key, sha256: file.sha256, bytes: file.bytes }).onConflictDoNothing().returning()
    if (written) await whenKept?.(tx, row)
  })
}

async function findCorrected(db: Database, invoiceId: string) {
  const [corrected] = await db.select({ number: invoices.number, issuedOn: invoices.issuedOn }).from(invoices).where(eq(invoices.id, invoiceId))
  return corrected ?? null
}

/**
 * Renders an invoice and mails it, once.
 *
 * @param db database
 * @param tools the file store and the fonts
 * @param invoiceId which invoice
 */
export function renderInvoice(db: Database, tools: PaperTools, invoiceId: string): Promise<void> {
  return keepInvoicePaper(db, tools, invoiceId, (tx, { invoice, run }) => queueRunMail(tx, 'invoiced', run, { invoiceNumber: invoice.number, attachInvoiceId: invoiceId }))
}
