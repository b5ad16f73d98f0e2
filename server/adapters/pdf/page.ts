import PDFDocument from 'pdfkit'

/** TrueType files of the printed face; the built-in fonts have no Θ, γ or ³. */
export interface PdfFonts { regular: Buffer, medium: Buffer, semiBold: Buffer }

/** Faces by name. */
export type Face = 'regular' | 'medium' | 'semiBold'

/** Ink, grey and line of printed papers; the screen's day colours. */
export const PRINT = { ink: '#17212b', muted: '#5a6772', line: '#b9b3a4', cold: '#122f57', ember: '#b8502a' } as const

/** A4 with margins, points. */
export const PAGE = { width: 595.28, height: 841.89, left: 56, right: 56, top: 52, bottom: 64 } as const

/** Width between the margins, points. */
export const TEXT_WIDTH = PAGE.width - PAGE.left - PAGE.right

/**
 * Opens a paper: A4, our fonts, tagged title and language, a fixed date so that the same facts give the same bytes.
 *
 * @param fonts faces to embed
 * @param info title, author and the paper's own date
 */
export function openPaper(fonts: PdfFonts, info: { title: string, author: string, date: Date }): PDFKit.PDFDocument {
  const doc = new PDFDocument({
    size: 'A4', margins: { top: PAGE.top, bottom: 0, left: PAGE.left, right: PAGE.right }, bufferPages: true, lang: 'en', displayTitle: true,
    info: { Title: info.title, Author: info.author, Producer: 'Holdtime', Creator: 'Holdtime', CreationDate: info.date, ModDate: info.date },
  })
  doc.registerFont('regular', fonts.regular)
  doc.registerFont('medium', fonts.medium)
  doc.registerFont('semiBold', fonts.semiBold)
  return doc
}

/** Text at a place, in a face, size and colour. */
export function put(doc: PDFKit.PDFDocument, text: string, x: number, y: number, style: { face?: Face, size?: number, color?: string, width?: number, align?: 'left' | 'right' } = {}) {
  doc.font(style.face ?? 'regular').fontSize(style.size ?? 9.5).fillColor(style.color ?? PRINT.ink)
    .text(text, x, y, { width: style.width, align: style.align ?? 'left', lineBreak: style.width !== undefined })
}

/** A hairline across the text width. */
export function rule(doc: PDFKit.PDFDocument, y: number, weight = 0.5, color: string = PRINT.line) {
  doc.moveTo(PAGE.left, y).lineTo(PAGE.width - PAGE.right, y).lineWidth(weight).strokeColor(color).stroke()
}

/** The mark: a basin with its ember at the floor. */
export function mark(doc: PDFKit.PDFDocument, x: number, y: number) {
  doc.moveTo(x, y).lineTo(x + 4, y).bezierCurveTo(x + 8, y, x + 8, y + 14, x + 14, y + 14).bezierCurveTo(x + 20, y + 14, x + 20, y, x + 24, y).lineTo(x + 28, y).lineWidth(2).strokeColor(PRINT.cold).stroke()
  doc.circle(x + 14, y + 14, 2.4).fill(PRINT.ember)
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
