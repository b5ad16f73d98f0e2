import PDFDocument from 'pdfkit'

/** TrueType files of the printed face; the built-in fonts have no Θ, γ or ³. */
export interface PdfFonts { regular: Buffer, medium: Buffer, semiBold: Buffer }

/** Faces by name. */
export type Face = 'regular' | 'medium' | 'semiBold'

/** How a text is set; with a width it is broken into lines. */
export interface TextStyle { face?: Face, size?: number, color?: string, width?: number, align?: 'left' | 'right' }

/** Ink, grey and line of printed papers; the screen's day colours. */
export const PRINT = { ink: '#17212b', muted: '#5a6772', line: '#ddd8cc', lineStrong: '#b9b3a4', tint: '#f6f4ee', cold: '#122f57', helium: '#7fb4cc', ember: '#b8502a', onCold: '#fffefb' } as const

/** A4 with margins, points. */
export const PAGE = { width: 595.28, height: 841.89, left: 56, right: 56, top: 52, bottom: 72 } as const

/** Width between the margins, points. */
export const TEXT_WIDTH = PAGE.width - PAGE.left - PAGE.right

/** Right edge of the text, points. */
export const RIGHT = PAGE.width - PAGE.right

/** Lowest place for text above the footer, points. */
export const FLOOR = PAGE.height - PAGE.bottom

const BODY_SIZE = 9.5

/**
 * Opens a paper: A4, our fonts, title and language, a fixed date so that the same facts give the same bytes.
 *
 * @param fonts faces to embed
 * @param info title, author and the paper's own date
 */
export function openPaper(fonts: PdfFonts, info: { title: string, author: string, date: Date }): PDFKit.PDFDocument {
  const doc = new PDFDocument({
    size: 'A4', margins: { top: PAGE.top, bottom: 0, left: PAGE.left, right: PAGE.right }, bufferPages: true, pdfVersion: '1.7', lang: 'en', displayTitle: true,
    info: { Title: info.title, Author: info.author, Producer: 'Holdtime', Creator: 'Holdtime', CreationDate: info.date, ModDate: info.date },
  })
  doc.registerFont('regular', fonts.regular)
  doc.registerFont('medium', fonts.medium)
  doc.registerFont('semiBold', fonts.semiBold)
  return doc
}

/** Text at a place, in a face, size and colour. */
export function put(doc: PDFKit.PDFDocument, text: string, x: number, y: number, style: TextStyle = {}) {
  setType(doc, style).fillColor(style.color ?? PRINT.ink).text(text, x, y, { width: style.width, align: style.align ?? 'left', lineBreak: style.width !== undefined })
}

/** Text that ends at a right edge. */
export function putRight(doc: PDFKit.PDFDocument, text: string, right: number, y: number, style: Omit<TextStyle, 'align' | 'width'> = {}) {
  setType(doc, style)
  put(doc, text, right - doc.widthOfString(text), y, style)
}

/** Height of a text broken into lines of a width, points. */
export function heightOf(doc: PDFKit.PDFDocument, text: string, style: TextStyle & { width: number }): number {
  return setType(doc, style).heightOfString(text, { width: style.width })
}

function setType(doc: PDFKit.PDFDocument, style: TextStyle): PDFKit.PDFDocument {
  return doc.font(style.face ?? 'regular').fontSize(style.size ?? BODY_SIZE)
}

/** A line across the text, or from one place to another. */
export function rule(doc: PDFKit.PDFDocument, y: number, style: { weight?: number, color?: string, from?: number, to?: number } = {}) {
  doc.moveTo(style.from ?? PAGE.left, y).lineTo(style.to ?? RIGHT, y).lineWidth(style.weight ?? 0.5).strokeColor(style.color ?? PRINT.lineStrong).stroke()
}

/** A filled panel with the corners of the screen's cards. */
export function panel(doc: PDFKit.PDFDocument, box: { x: number, y: number, width: number, height: number }, color: string = PRINT.tint) {
  doc.roundedRect(box.x, box.y, box.width, box.height, 4).fill(color)
}

/** The mark: a basin with its ember at the floor. */
export function mark(doc: PDFKit.PDFDocument, x: number, y: number) {
  doc.moveTo(x, y).lineTo(x + 4, y).bezierCurveTo(x + 12, y, x + 9, y + 16, x + 15, y + 16).bezierCurveTo(x + 21, y + 16, x + 18, y, x + 26, y).lineTo(x + 30, y).lineWidth(2).lineCap('round').strokeColor(PRINT.cold).stroke()
  doc.lineCap('butt').circle(x + 15, y + 16, 2.5).fill(PRINT.ember)
}

/**
 * The foot of every page: who sent it, what it is, page of pages. Done last, when the pages are known.
 *
 * @param doc the paper
 * @param title what the paper is
 * @param sender one line about who sends it
 */
export function putFeet(doc: PDFKit.PDFDocument, title: string, sender: string) {
  const { start, count } = doc.bufferedPageRange()
  const style = { size: 8, color: PRINT.muted }
  for (let page = start; page < start + count; page += 1) {
    doc.switchToPage(page)
    const y = FLOOR + 24
    rule(doc, y - 8)
    put(doc, sender, PAGE.left, y, style)
    putRight(doc, `${title}  ·  page ${page + 1} of ${count}`, RIGHT, y, style)
  }
}

/** Closes the paper and gives its bytes. */
export function closePaper(doc: PDFKit.PDFDocument): Promise<Buffer> {
  return new Promise((resolve, reject) => {
    const chunks: Buffer[] = []
    doc.on('data', (chunk: Buffer) => chunks.push(chunk))
    doc.on('end', () => resolve(Buffer.concat(chunks)))
    doc.on('error', reject)
    doc.end()
  })
}
