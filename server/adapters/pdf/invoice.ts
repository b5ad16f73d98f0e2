import { formatDate, formatSlot } from '#shared/utils/format-date'
import { formatMoney } from '#shared/utils/format-money'
import { formatNumber } from '#shared/utils/format-number'
import type { invoiceLines, invoices, runs } from '#server/db/schema'
import { closePaper, mark, openPaper, PAGE, type PdfFonts, PRINT, put, rule, TEXT_WIDTH } from './page'

export type { PdfFonts } from './page'

/** What an invoice's paper is made from. */
export interface InvoicePaper {
  invoice: typeof invoices.$inferSelect
  lines: readonly (typeof invoiceLines.$inferSelect)[]
  run: Pick<typeof runs.$inferSelect, 'number' | 'title' | 'slot' | 'startedAt' | 'finishedAt' | 'cutShort'>
  cryostat: string
  timeZone: string
}

/** Columns of the table: where each ends (numbers are set flush right), points from the left edge. */
const COLUMN = { label: PAGE.left, estimated: 322, used: 392, price: 462, amount: PAGE.width - PAGE.right } as const
const ROW = 19
const LOWEST_ROW = PAGE.height - PAGE.bottom - 40

/**
 * Sets an invoice or credit note: parties, run, the estimate beside what was used, VAT, what was paid and what is due.
 *
 * @param paper the issued facts
 * @param fonts faces to embed
 * @returns the PDF; the same facts give the same bytes
 */
export function renderInvoicePdf(paper: InvoicePaper, fonts: PdfFonts): Promise<Buffer> {
  const { invoice } = paper
  const title = `${invoice.kind === 'invoice' ? 'Invoice' : 'Credit note'} ${invoice.number}`
  const doc = openPaper(fonts, { title, author: invoice.seller.name, date: invoice.issuedAt })
  let y = head(doc, paper, title)
  y = table(doc, paper, y)
  y = totals(doc, paper, y)
  closing(doc, paper, y)
  numberPages(doc, title)
  return closePaper(doc)
}

function head(doc: PDFKit.PDFDocument, { invoice, run, cryostat, timeZone }: InvoicePaper, title: string): number {
  mark(doc, PAGE.left, PAGE.top)
  put(doc, invoice.seller.name, PAGE.left + 40, PAGE.top, { face: 'semiBold', size: 12 })
  put(doc, [...invoice.seller.addressLines, invoice.seller.email].join('  ·  '), PAGE.left + 40, PAGE.top + 17, { size: 8.5, color: PRINT.muted })
  put(doc, `VAT ${invoice.seller.vatId ?? ''}`, PAGE.left + 40, PAGE.top + 29, { size: 8.5, color: PRINT.muted })

  let y = PAGE.top + 78
  put(doc, title, PAGE.left, y, { face: 'semiBold', size: 22 })
  y += 44
  party(doc, 'To', invoice.buyer, PAGE.left, y)
  facts(doc, [
    ['Issued', formatDate(invoice.issuedOn)],
    ['Supplied', formatDate(invoice.suppliedOn)],
    ...(invoice.dueOn ? [['Due', formatDate(invoice.dueOn)]] : []),
    ...(invoice.reference ? [['Reference', invoice.reference]] : []),
  ] as [string, string][], 350, y)
  y += 92
  rule(doc, y)
  put(doc, `Run ${String(run.number).padStart(4, '0')} · ${run.title}`, PAGE.left, y + 9, { face: 'medium', size: 10.5 })
  put(doc, `${cryostat} · ${formatSlot(run.startedAt ?? run.slot.startsAt, run.finishedAt ?? run.slot.endsAt, timeZone)} (${timeZone})${run.cutShort ? ' · cut short' : ''}`, PAGE.left, y + 25, { size: 8.5, color: PRINT.muted })
  return y + 50
}

function party(doc: PDFKit.PDFDocument, label: string, who: InvoicePaper['invoice']['buyer'], x: number, y: number) {
  put(doc, label, x, y, { size: 8.5, color: PRINT.muted })
  put(doc, who.name, x, y + 13, { face: 'medium', size: 10, width: 270 })
  const lines = [...who.addressLines, who.email, ...(who.vatId ? [`VAT ${who.vatId}`] : [])]
  lines.forEach((line, index) => put(doc, line, x, y + 28 + index * 12.5, { size: 9.5 }))
}

function facts(doc: PDFKit.PDFDocument, rows: [string, string][], x: number, y: number) {
  rows.forEach(([label, value], index) => {
    put(doc, label, x, y + index * 15, { size: 9, color: PRINT.muted })
    put(doc, value, x + 62, y + index * 15, { size: 9.5, face: 'medium' })
  })
}

function tableHead(doc: PDFKit.PDFDocument, y: number): number {
  const heads: [string, number][] = [['estimated', COLUMN.estimated], ['used', COLUMN.used], ['price', COLUMN.price], ['amount', COLUMN.amount]]
  put(doc, 'What', COLUMN.label, y, { size: 8.5, color: PRINT.muted })
  for (const [label, right] of heads) put(doc, label, right - 90, y, { size: 8.5, color: PRINT.muted, width: 90, align: 'right' })
  rule(doc, y + 14, 0.8, PRINT.ink)
  return y + 20
}

function table(doc: PDFKit.PDFDocument, { invoice, lines }: InvoicePaper, start: number): number {
  const money = (amount: number) => formatMoney({ amount, currency: invoice.currency })
  let y = tableHead(doc, start)
  for (const line of lines) {
    if (y > LOWEST_ROW) {
      doc.addPage()
      y = tableHead(doc, PAGE.top)
    }
    const decimals = Number.isInteger(line.quantity) && (line.estimatedQuantity === null || Number.isInteger(line.estimatedQuantity)) ? 0 : line.unit.startsWith('L') ? 1 : 2
    put(doc, line.label, COLUMN.label, y)
    put(doc, line.estimatedQuantity === null ? '–' : `${formatNumber(line.estimatedQuantity, decimals)} ${line.unit}`, COLUMN.estimated - 100, y, { color: PRINT.muted, width: 100, align: 'right' })
    put(doc, `${formatNumber(line.quantity, decimals)} ${line.unit}`, COLUMN.used - 90, y, { width: 90, align: 'right' })
    put(doc, money(line.unitPriceMinor), COLUMN.price - 90, y, { width: 90, align: 'right', color: PRINT.muted })
    put(doc, money(line.netMinor), COLUMN.amount - 90, y, { width: 90, align: 'right', face: 'medium' })
    rule(doc, y + 14.5, 0.3)
    y += ROW
  }
  return y
}

function totals(doc: PDFKit.PDFDocument, { invoice, lines }: InvoicePaper, start: number): number {
  const money = (amount: number) => formatMoney({ amount, currency: invoice.currency })
  let y = start + 8
  if (y > PAGE.height - PAGE.bottom - 130) {
    doc.addPage()
    y = PAGE.top
  }
  const estimated = lines.reduce((sum, line) => sum + (line.estimatedNetMinor ?? 0), 0)
  const vatLabel = invoice.reverseCharge ? 'VAT (reverse charge)' : `VAT ${formatNumber(invoice.vatBasisPoints / 100, invoice.vatBasisPoints % 100 === 0 ? 0 : 2)} %`
  const rows: [string, string, boolean?][] = [
    [`Net (estimated ${money(estimated)})`, money(invoice.netMinor)],
    [vatLabel, money(invoice.vatMinor)],
    ['Total', money(invoice.totalMinor), true],
    ...(invoice.prepaidMinor > 0 ? [['Deposit paid', money(-invoice.prepaidMinor)] as [string, string]] : []),
    [invoice.dueMinor < 0 ? 'To be refunded' : 'Amount due', money(Math.abs(invoice.dueMinor)), true],
  ]
  for (const [label, value, strong] of rows) {
    put(doc, label, 250, y, { face: strong ? 'semiBold' : 'regular', size: strong ? 10.5 : 9.5, width: 200, align: 'right' })
    put(doc, value, COLUMN.amount - 100, y, { face: strong ? 'semiBold' : 'medium', size: strong ? 10.5 : 9.5, width: 100, align: 'right' })
    y += strong ? 19 : 16
  }
  return y + 12
}

function closing(doc: PDFKit.PDFDocument, { invoice }: InvoicePaper, start: number) {
  const paragraphs = [
    invoice.paymentText,
    ...(invoice.reverseCharge ? ['Reverse charge: VAT is to be accounted for by the customer (Article 196 of Directive 2006/112/EC).'] : []),
    'Quantities are as logged on the run sheet; the estimate is the one quoted when the days were asked for. Helium is given as litres of liquid at 4.2 K and 101.325 kPa.',
  ]
  let y = start
  for (const text of paragraphs) {
    put(doc, text, PAGE.left, y, { size: 9, width: TEXT_WIDTH, color: text === invoice.paymentText ? PRINT.ink : PRINT.muted })
    y = doc.y + 7
  }
}

function numberPages(doc: PDFKit.PDFDocument, title: string) {
  const { start, count } = doc.bufferedPageRange()
  for (let page = start; page < start + count; page += 1) {
    doc.switchToPage(page)
    const y = PAGE.height - PAGE.bottom + 22
    rule(doc, y - 8, 0.3)
    put(doc, title, PAGE.left, y, { size: 8, color: PRINT.muted })
    put(doc, `Page ${page + 1} of ${count}`, PAGE.width - PAGE.right - 100, y, { size: 8, color: PRINT.muted, width: 100, align: 'right' })
  }
}
