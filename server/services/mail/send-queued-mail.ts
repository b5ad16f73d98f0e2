import { createHash } from 'node:crypto'
import { eq } from 'drizzle-orm'
import type { MailTransport } from '#server/adapters/mail/transport'
import type { FileStore } from '#server/adapters/storage/files'
import type { Database } from '#server/db/client'
import { invoiceDocuments, invoices } from '#server/db/schema'
import type { JobPayloads } from '#server/jobs/queue'

/**
 * Sends a queued mail, with the invoice's PDF where it carries one.
 *
 * @param db database
 * @param tools mail server and file store
 * @param mail as queued; its key becomes the message id, so that a mail sent again is shown once
 */
export async function sendQueuedMail(db: Database, tools: { mail: MailTransport, files: FileStore }, mail: JobPayloads['send-mail']): Promise<void> {
  const messageId = `${createHash('sha256').update(mail.key).digest('hex').slice(0, 32)}@holdtime`
  await tools.mail.send({ to: mail.to, subject: mail.subject, text: mail.text, messageId, attachments: mail.attachInvoiceId ? await attachment(db, tools.files, mail.attachInvoiceId) : [] })
}

async function attachment(db: Database, files: FileStore, invoiceId: string) {
  const [row] = await db.select({ number: invoices.number, fileKey: invoiceDocuments.fileKey }).from(invoiceDocuments).innerJoin(invoices, eq(invoices.id, invoiceDocuments.invoiceId)).where(eq(invoiceDocuments.invoiceId, invoiceId))
  const content = row ? await files.getFile(row.fileKey) : null
  return row && content ? [{ filename: `invoice-${row.number}.pdf`, content, contentType: 'application/pdf' }] : []
}
