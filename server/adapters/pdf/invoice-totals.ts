import { formatNumber } from '#shared/utils/format-number'
import { putNextPage } from './invoice-head'
import { type InvoicePaper, moneyOf } from './invoice-paper'
import { COLUMN } from './invoice-table'
import { FLOOR, heightOf, PAGE, panel, PRINT, put, putRight, RIGHT, rule, TEXT_WIDTH } from './page'

const TOTALS_HEIGHT = 138
const FROM = 300
const NOTE = { size: 9, width: TEXT_WIDTH }

/** Net, VAT, total, what was paid before and what is due; kept together on one page. Returns where they end. */
export function putTotals(doc: PDFKit.PDFDocument, paper: InvoicePaper, start: number): number {
  const { invoice, lines } = paper
  let y = start + TOTALS_HEIGHT > FLOOR ? putNextPage(doc, paper) : start + 9
  const row = (label: string, amountMinor: number, style: { strong?: boolean, estimatedMinor?: number } = {}) => {
    const face = style.strong ? 'semiBold' : 'regular'
    put(doc, label, FROM, y, { face })
    if (style.estimatedMinor !== undefined) putRight(doc, moneyOf(paper, style.estimatedMinor), COLUMN.estimatedNet, y, { color: PRINT.muted })
    putRight(doc, moneyOf(paper, amountMinor), COLUMN.net, y, { face: style.strong ? 'semiBold' : 'medium' })
    y += 17
  }
  row('Net', invoice.netMinor, { estimatedMinor: lines.reduce((sum, line) => sum + (line.estimatedNetMinor ?? 0), 0) })
  row(vatLabel(paper), invoice.vatMinor)
  rule(doc, y - 2, { from: FROM })
  y += 4
  row('Total', invoice.totalMinor, { strong: true })
  if (invoice.prepaidMinor > 0) row('Deposit paid before', -invoice.prepaidMinor)
  y += 3
  panel(doc, { x: FROM - 12, y, width: RIGHT - FROM + 12, height: 29 }, PRINT.cold)
  put(doc, dueLabel(paper), FROM, y + 7, { face: 'medium', size: 11, color: PRINT.onCold })
  putRight(doc, moneyOf(paper, Math.abs(invoice.dueMinor)), COLUMN.net - 12, y + 7, { face: 'semiBold', size: 11, color: PRINT.onCold })
  return y + 48
}

function vatLabel(paper: InvoicePaper): string {
  const { vatBasisPoints, reverseCharge, netMinor } = paper.invoice
  if (reverseCharge) return 'VAT, reverse charge'
  return `VAT ${formatNumber(vatBasisPoints / 100, vatBasisPoints % 100 === 0 ? 0 : 2)} % of ${moneyOf(paper, netMinor)}`
}

function dueLabel({ invoice }: InvoicePaper): string {
  if (invoice.kind === 'credit-note') return 'Amount credited'
  return invoice.dueMinor < 0 ? 'To be refunded' : 'Amount due'
}

/** How it is paid, the words the law asks for, and how the quantities came about. */
export function putNotes(doc: PDFKit.PDFDocument, paper: InvoicePaper, start: number) {
  const { invoice } = paper
  const notes: [string, string][] = [
    ['Payment', invoice.paymentText],
    // Words and article: Directive 2006/112/EC, Art 226(11a) and 196 (from memory).
    ...(invoice.reverseCharge ? [['VAT', 'Reverse charge: VAT is to be accounted for by the customer (Article 196 of Directive 2006/112/EC).'] as [string, string]] : []),
    ['Quantities', 'As logged on the run sheet; the estimate is the one quoted when the days were asked for. Helium is given as litres of liquid at 4.2 K and 101.325 kPa.'],
  ]
  let y = start
  for (const [title, text] of notes.filter(([, words]) => words !== '')) {
    const height = heightOf(doc, text, NOTE)
    if (y + height + 13 > FLOOR) y = putNextPage(doc, paper)
    put(doc, title, PAGE.left, y, { face: 'medium', size: 9 })
    put(doc, text, PAGE.left, y + 13, { ...NOTE, color: PRINT.muted })
    y += height + 24
  }
}
