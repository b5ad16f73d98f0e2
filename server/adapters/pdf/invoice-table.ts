import { formatNumber } from '#shared/utils/format-number'
import { putNextPage } from './invoice-head'
import { type InvoicePaper, moneyOf } from './invoice-paper'
import { FLOOR, heightOf, PAGE, PRINT, put, putRight, RIGHT, rule } from './page'

/** Where the columns of figures end, points from the left edge of the page. */
export const COLUMN = { estimated: 282, used: 344, price: 404, estimatedNet: 472, net: RIGHT } as const

const LABEL_WIDTH = 162
const HEAD = { size: 8, color: PRINT.muted }
const ROW_PADDING = 4.5

type Line = InvoicePaper['lines'][number]

/** The lines, the estimate beside what was used, over as many pages as they need. Returns where the table ends. */
export function putLines(doc: PDFKit.PDFDocument, paper: InvoicePaper, start: number): number {
  let y = putHead(doc, start)
  for (const line of paper.lines) {
    const height = heightOf(doc, line.label, { width: LABEL_WIDTH }) + 2 * ROW_PADDING
    if (y + height > FLOOR) y = putHead(doc, putNextPage(doc, paper))
    putLine(doc, paper, line, y + ROW_PADDING)
    y += height
    rule(doc, y, { color: PRINT.line })
  }
  return y
}

function putHead(doc: PDFKit.PDFDocument, y: number): number {
  putRight(doc, 'Quantity', COLUMN.used, y, { ...HEAD, face: 'medium' })
  putRight(doc, 'Net amount', COLUMN.net, y, { ...HEAD, face: 'medium' })
  rule(doc, y + 12.5, { color: PRINT.line, from: COLUMN.estimated - 48, to: COLUMN.used })
  rule(doc, y + 12.5, { color: PRINT.line, from: COLUMN.estimatedNet - 48, to: COLUMN.net })
  const heads: [string, number][] = [['estimated', COLUMN.estimated], ['used', COLUMN.used], ['unit price', COLUMN.price], ['estimated', COLUMN.estimatedNet], ['charged', COLUMN.net]]
  put(doc, 'Item', PAGE.left, y + 15, HEAD)
  for (const [label, right] of heads) putRight(doc, label, right, y + 15, HEAD)
  rule(doc, y + 29, { weight: 0.9, color: PRINT.ink })
  return y + 29
}

function putLine(doc: PDFKit.PDFDocument, paper: InvoicePaper, line: Line, y: number) {
  const quantity = (value: number) => `${formatNumber(value, decimalsOf(line))} ${line.unit}`
  put(doc, line.label, PAGE.left, y, { width: LABEL_WIDTH })
  putRight(doc, line.estimatedQuantity === null ? '–' : quantity(line.estimatedQuantity), COLUMN.estimated, y, { color: PRINT.muted })
  putRight(doc, quantity(line.quantity), COLUMN.used, y)
  putRight(doc, moneyOf(paper, line.unitPriceMinor), COLUMN.price, y, { color: PRINT.muted })
  putRight(doc, line.estimatedNetMinor === null ? '–' : moneyOf(paper, line.estimatedNetMinor), COLUMN.estimatedNet, y, { color: PRINT.muted })
  putRight(doc, moneyOf(paper, line.netMinor), COLUMN.net, y, { face: 'medium' })
}

/** Whole numbers stay whole; litres are charged to a tenth, days and hours to a hundredth. */
function decimalsOf(line: Line): number {
  if (Number.isInteger(line.quantity) && Number.isInteger(line.estimatedQuantity ?? 0)) return 0
  return line.unit.startsWith('L') ? 1 : 2
}
