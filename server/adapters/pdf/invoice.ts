import { putInvoiceHead } from './invoice-head'
import { type InvoicePaper, titleOf } from './invoice-paper'
import { putLines } from './invoice-table'
import { putNotes, putTotals } from './invoice-totals'
import { closePaper, openPaper, type PdfFonts, putFeet } from './page'

export type { InvoicePaper } from './invoice-paper'
export type { PdfFonts } from './page'

/**
 * Sets an invoice or credit note: parties, run, the estimate beside what was used, VAT, what was paid and what is due.
 *
 * @param paper the issued facts
 * @param fonts faces to embed
 * @returns the PDF; the same facts give the same bytes
 */
export function renderInvoicePdf(paper: InvoicePaper, fonts: PdfFonts): Promise<Buffer> {
  const { seller, issuedAt } = paper.invoice
  const title = titleOf(paper)
  const doc = openPaper(fonts, { title, author: seller.name, date: issuedAt })
  putNotes(doc, paper, putTotals(doc, paper, putLines(doc, paper, putInvoiceHead(doc, paper))))
  putFeet(doc, title, [seller.name, ...(seller.vatId ? [`VAT ${seller.vatId}`] : []), seller.email].join('  ·  '))
  return closePaper(doc)
}
