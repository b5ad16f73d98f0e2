import { setResponseHeaders } from 'h3'
import { DomainError } from '#shared/errors'
import { invoiceParams } from '#shared/schemas/invoice'
import { findInvoiceDocument } from '#server/services/invoices/queries'
import { defineApi } from '#server/utils/define-api'
import { useFileStore } from '#server/utils/files'

/** The invoice's paper, as it was issued. */
export default defineApi({ access: 'invoice:read', params: invoiceParams }, async ({ event, db, actor, params }) => {
  const document = await findInvoiceDocument(db, { invoiceId: params.invoiceId, actor })
  const content = document && await useFileStore().getFile(document.fileKey)
  if (!document || !content) throw new DomainError('unavailable', 'The paper of this invoice is being made. Try again in a moment.')
  setResponseHeaders(event, { 'content-type': 'application/pdf', 'content-disposition': `attachment; filename="invoice-${document.number}.pdf"`, 'x-content-type-options': 'nosniff' })
  return content
})
