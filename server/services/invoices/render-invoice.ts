import { eq } from 'drizzle-orm'
import { type PdfFonts, renderInvoicePdf } from '#server/adapters/pdf/invoice'
import type { FileStore } from '#server/adapters/storage/files'
import type { Database } from '#server/db/client'
import { cryostats, invoiceDocuments, invoiceLines, invoices, runs } from '#server/db/schema'
import { queueRunMail } from '#server/services/mail/queue-run-mail'
import { readFacility } from '#server/services/facility/queries'

/**
 * Renders an issued invoice once, keeps the file with its hash, and mails it. The same invoice always gives the same bytes.
 *
 * @param db database
 * @param tools the file store and the fonts
 * @param invoiceId which invoice
 */
export async function renderInvoice(db: Database, tools: { files: FileStore, fonts: PdfFonts }, invoiceId: string): Promise<void> {
  const [standing] = await db.select().from(invoiceDocuments).where(eq(invoiceDocuments.invoiceId, invoiceId))
  if (standing) return
  const [row] = await db.select({ invoice: invoices, run: runs, cryostat: cryostats.name }).from(invoices).innerJoin(runs, eq(runs.id, invoices.runId)).innerJoin(cryostats, eq(cryostats.id, runs.cryostatId)).where(eq(invoices.id, invoiceId))
  if (!row) return
  const lines = await db.select().from(invoiceLines).where(eq(invoiceLines.invoiceId, invoiceId)).orderBy(invoiceLines.position)
  const { timeZone } = await readFacility(db)
  const pdf = await renderInvoicePdf({ invoice: row.invoice, lines, run: row.run, cryostat: row.cryostat, timeZone }, tools.fonts)
  const file = await tools.files.putFile(pdf)
  await db.transaction(async (tx) => {
    const [written] = await tx.insert(invoiceDocuments).values({ invoiceId, fileKey: file.key, sha256: file.sha256, bytes: file.bytes }).onConflictDoNothing().returning()
    if (written) await queueRunMail(tx, 'invoiced', row.run, { invoiceNumber: row.invoice.number, attachInvoiceId: invoiceId })
  })
}
