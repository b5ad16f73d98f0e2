import { DomainError } from '#shared/errors'
import type { TableDialect } from '#shared/heat-capacity/table/cells'
import { cellNumber, COMMENT_LINE } from '#shared/heat-capacity/table/cells'
import { cellsOf, findDialect } from '#shared/heat-capacity/table/dialect'
import type { SuggestedMapping } from '#shared/heat-capacity/table/head'
import { findHead, suggestMapping } from '#shared/heat-capacity/table/head'
import { createLineCutter } from '#shared/heat-capacity/table/lines'

/** Most rows and columns that are read. */
export const MOST_TABLE_ROWS = 500_000
export const MOST_TABLE_COLUMNS = 100

/** Lines looked at before the way the table is written is decided. */
const SNIFFED_LINES = 400
/** Cells that are no numbers are kept as text so far, to be shown with the reason; a column of words needs no more. */
const MOST_TEXTS = 20_000
const PREVIEW_ROWS = 20

/** A table as read: numbers by column, and whatever was no number, each with its place. It can be posted between threads. */
export interface Table {
  readonly dialect: TableDialect
  readonly heads: readonly string[]
  /** Line of the head, from 1; undefined when the file has none. */
  readonly headRow?: number
  readonly suggestedMapping: SuggestedMapping
  readonly rowCount: number
  /** One array a column, in the order of the heads; NaN where a cell is no number. */
  readonly columns: readonly Float64Array[]
  /** Line of the file of each row, from 1. */
  readonly rowNumbers: Int32Array
  /** Text of cells that are no numbers and not empty, by `row * columns.length + column`. */
  readonly texts: ReadonlyMap<number, string>
  /** Cells of each row that has more or fewer than the head. */
  readonly ragged: ReadonlyMap<number, number>
  readonly blankRows: number
  readonly commentRows: number
  /** First rows as they stand in the file. */
  readonly preview: readonly { readonly row: number, readonly cells: readonly string[] }[]
}

/** Reads a table that comes in pieces. */
export interface TableReader {
  /** Takes the next piece, text or bytes. */
  push: (chunk: string | Uint8Array) => void
  /** Ends the file. @throws DomainError when it is no table */
  finish: () => Table
  /** How far it is: rows read and bytes (or characters) seen. */
  progress: () => { readonly rows: number, readonly bytes: number }
}

/**
 * Makes a reader of text tables: any of the usual delimiters and decimal marks, byte-order marks, CRLF, quotes, comments, blank rows.
 * Memory is that of the numbers, so half a million rows can be read in a worker.
 *
 * @returns the reader; its `push` and `finish` throw a DomainError, with the line, for a file that is no table or is over a limit
 * @example const reader = createTableReader(); reader.push('T (K),C (mJ/(mol K))\n2,1.77\n'); reader.finish().rowCount // 1
 */
export function createTableReader(): TableReader {
  let sniffed: string[] | undefined = []
  let store: RowStore | undefined
  let lineNumber = 0
  let unclosed: { text: string, line: number } | undefined

  const cutter = createLineCutter((line) => {
    lineNumber += 1
    takeWholeLine(line)
  })

  /** A quoted cell may hold line ends: lines are joined until its quotes are closed. */
  function takeWholeLine(line: string): void {
    const startsAt = unclosed?.line ?? lineNumber
    const text = unclosed ? `${unclosed.text} ${line}` : line
    if (text.includes('"') && !COMMENT_LINE.test(text) && text.split('"').length % 2 === 0 && lineNumber - startsAt < 10) {
      unclosed = { text, line: startsAt }
      return
    }
    unclosed = undefined
    // Lines joined leave blank places, so that line numbers stay those of the file.
    if (sniffed) {
      while (sniffed.length < startsAt - 1) sniffed.push('')
      sniffed.push(text)
      if (sniffed.length >= SNIFFED_LINES) settle()
    }
    else store!.take(text, startsAt)
  }

  function settle(): void {
    const lines = sniffed ?? []
    sniffed = undefined
    const dialect = findDialect(lines)
    const head = findHead(lines, dialect)
    store = new RowStore(dialect, head.heads, head.line === undefined ? undefined : head.line + 1, lines.slice(0, head.firstDataLine))
    lines.slice(head.firstDataLine).forEach((line, index) => store!.take(line, head.firstDataLine + index + 1))
  }

  return {
    push: chunk => cutter.push(chunk),
    progress: () => ({ rows: store?.rowCount ?? 0, bytes: cutter.seen }),
    finish() {
      if (cutter.seen === 0) throw new DomainError('invalid', 'The file is empty. Choose the file with the measured table.', ['file'])
      cutter.finish()
      if (unclosed) {
        const left = unclosed
        unclosed = undefined
        if (sniffed) sniffed.push(left.text)
        else store!.take(left.text, left.line)
      }
      if (sniffed) settle()
      return store!.table()
    },
  }
}

/**
 * Reads a whole table at once.
 *
 * @param content text, or the bytes of the file
 * @throws DomainError when it is no table or is over a limit
 */
export function readTable(content: string | Uint8Array): Table {
  const reader = createTableReader()
  if (content.length > 0) reader.push(content)
  return reader.finish()
}

/** Collects rows into columns of numbers that grow by doubling. */
class RowStore {
  rowCount = 0
  private columns: Float64Array[]
  private rowNumbers = new Int32Array(1024)
  private readonly texts = new Map<number, string>()
  private readonly ragged = new Map<number, number>()
  private readonly preview: { row: number, cells: string[] }[] = []
  private blankRows = 0
  private commentRows = 0

  constructor(private readonly dialect: TableDialect, private readonly heads: readonly string[], private readonly headRow: number | undefined, linesAbove: readonly string[]) {
    if (heads.length > MOST_TABLE_COLUMNS) throw new DomainError('invalid', `The table has ${heads.length} columns; at most ${MOST_TABLE_COLUMNS} are read. Leave out those that are not needed.`, ['file'])
    this.columns = heads.map(() => new Float64Array(1024))
    this.commentRows = linesAbove.filter((line, index) => COMMENT_LINE.test(line) && index + 1 !== headRow).length
    this.blankRows = linesAbove.filter(line => line.trim() === '').length
  }

  take(line: string, lineNumber: number): void {
    if (line.trim() === '' || /^[\s,;|]*$/.test(line)) {
      this.blankRows += 1
      return
    }
    if (COMMENT_LINE.test(line)) {
      this.commentRows += 1
      return
    }
    if (this.rowCount >= MOST_TABLE_ROWS) throw new DomainError('invalid', `The table has more than ${MOST_TABLE_ROWS} rows. Cut it into parts or average the points, and upload those.`, ['file', lineNumber])
    if (this.rowCount === this.rowNumbers.length) this.grow()
    const cells = cellsOf(line, this.dialect.delimiter)
    const width = this.columns.length
    const row = this.rowCount
    const filled = lastFilled(cells)
    if (cells.length < width || filled > width) this.ragged.set(row, filled)
    for (let column = 0; column < width; column += 1) {
      const cell = cells[column] ?? ''
      const value = cellNumber(cell, this.dialect.decimal)
      this.columns[column]![row] = value
      if (Number.isNaN(value) && cell !== '' && this.texts.size < MOST_TEXTS && cell.trim() !== '') this.texts.set(row * width + column, cell.trim().slice(0, 80))
    }
    this.rowNumbers[row] = lineNumber
    if (this.preview.length < PREVIEW_ROWS) this.preview.push({ row: lineNumber, cells: cells.map(cell => cell.trim()) })
    this.rowCount += 1
  }

  table(): Table {
    const { dialect, heads, headRow, texts, ragged, blankRows, commentRows, preview, rowCount } = this
    return {
      dialect, heads, headRow, texts, ragged, blankRows, commentRows, preview, rowCount,
      suggestedMapping: headRow === undefined ? {} : suggestMapping(heads),
      columns: this.columns.map(column => column.slice(0, rowCount)),
      rowNumbers: this.rowNumbers.slice(0, rowCount),
    }
  }

  private grow(): void {
    const size = this.rowNumbers.length * 2
    this.columns = this.columns.map((column) => {
      const larger = new Float64Array(size)
      larger.set(column)
      return larger
    })
    const rowNumbers = new Int32Array(size)
    rowNumbers.set(this.rowNumbers)
    this.rowNumbers = rowNumbers
  }
}

/** Cells up to the last one that is not empty: a delimiter at the end of a line makes no column. */
function lastFilled(cells: readonly string[]): number {
  let count = cells.length
  while (count > 0 && cells[count - 1]!.trim() === '') count -= 1
  return count
}
