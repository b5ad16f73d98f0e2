import { formatDate, formatSlot } from '#shared/utils/format-date'
import { type InvoicePaper, titleOf } from './invoice-paper'
import { heightOf, mark, PAGE, panel, PRINT, put, putRight, RIGHT, rule, TEXT_WIDTH } from './page'

type Party = InvoicePaper['invoice']['buyer']

const SMALL = { size: 8.5, color: PRINT.muted }
const FACTS_AT = 366
const FACTS_INDENT = 66

/** The head of the first page: seller, title, buyer, dates and the run. Returns where the table begins. */
export function putInvoiceHead(doc: PDFKit.PDFDocument, paper: InvoicePaper): number {
  const { invoice } = paper
  putSeller(doc, invoice.seller)
  let y = Math.max(PAGE.top + 82, PAGE.top + 20 + (invoice.seller.addressLines.length + 3) * 12.5)
  put(doc, titleOf(paper), PAGE.left, y, { face: 'semiBold', size: 23 })
  y += 35
  if (paper.corrects) {
    put(doc, `Corrects invoice ${paper.corrects.number} of ${formatDate(paper.corrects.issuedOn)}.`, PAGE.left, y, { color: PRINT.muted })
    y += 18
  }
  y += 14
  return putRun(doc, paper, Math.max(putParty(doc, invoice.buyer, y), putFacts(doc, paper, y)) + 18)
}

function putSeller(doc: PDFKit.PDFDocument, seller: Party) {
  mark(doc, PAGE.left, PAGE.top + 4)
  put(doc, seller.name, PAGE.left + 42, PAGE.top + 3, { face: 'semiBold', size: 13 })
  const lines = [...seller.addressLines, seller.email, ...(seller.vatId ? [`VAT ${seller.vatId}`] : [])]
  lines.forEach((line, index) => putRight(doc, line, RIGHT, PAGE.top + index * 12.5, SMALL))
}

function putParty(doc: PDFKit.PDFDocument, buyer: Party, top: number): number {
  const width = FACTS_AT - PAGE.left - 24
  put(doc, 'To', PAGE.left, top, SMALL)
  let y = top + 14
  for (const [index, line] of [buyer.name, ...buyer.addressLines, buyer.email, ...(buyer.vatId ? [`VAT ${buyer.vatId}`] : [])].entries()) {
    const style = { face: index === 0 ? 'semiBold' : 'regular', size: index === 0 ? 10.5 : 9.5, width } as const
    put(doc, line, PAGE.left, y, style)
    y += heightOf(doc, line, style) + (index === 0 ? 2 : 0.5)
  }
  return y
}

function putFacts(doc: PDFKit.PDFDocument, { invoice }: InvoicePaper, top: number): number {
  const rows: [string, string][] = [
    ['Issued', formatDate(invoice.issuedOn)],
    ['Supplied', formatDate(invoice.suppliedOn)],
    ...(invoice.dueOn ? [['Due', formatDate(invoice.dueOn)] as [string, string]] : []),
    ...(invoice.reference ? [['Reference', invoice.reference] as [string, string]] : []),
    ['Currency', invoice.currency],
  ]
  let y = top
  for (const [label, value] of rows) {
    const style = { face: 'medium', width: RIGHT - FACTS_AT - FACTS_INDENT } as const
    put(doc, label, FACTS_AT, y, { color: PRINT.muted })
    put(doc, value, FACTS_AT + FACTS_INDENT, y, style)
    y += heightOf(doc, value, style) + 4
  }
  return y
}

function putRun(doc: PDFKit.PDFDocument, { run, cryostat, timeZone }: InvoicePaper, top: number): number {
  const title = `Run ${String(run.number).padStart(4, '0')} · ${run.title}`
  const when = `${cryostat}, ${formatSlot(run.startedAt ?? run.slot.startsAt, run.finishedAt ?? run.slot.endsAt, timeZone)} (${timeZone})${run.cutShort ? ', cut short' : ''}`
  const width = TEXT_WIDTH - 28
  const titleHeight = heightOf(doc, title, { face: 'medium', size: 10.5, width })
  const height = titleHeight + heightOf(doc, when, { ...SMALL, width }) + 21
  panel(doc, { x: PAGE.left, y: top, width: TEXT_WIDTH, height })
  put(doc, title, PAGE.left + 14, top + 9, { face: 'medium', size: 10.5, width })
  put(doc, when, PAGE.left + 14, top + 11 + titleHeight, { ...SMALL, width })
  return top + height + 18
}

/** The head of a following page. Returns where its text begins. */
export function putNextPage(doc: PDFKit.PDFDocument, paper: InvoicePaper): number {
  doc.addPage()
  put(doc, `${titleOf(paper)}, continued`, PAGE.left, PAGE.top, { face: 'medium', size: 10.5 })
  rule(doc, PAGE.top + 19)
  return PAGE.top + 32
}
