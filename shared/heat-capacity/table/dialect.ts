import Papa from 'papaparse'
import { DomainError } from '#shared/errors'
import type { TableDialect } from '#shared/heat-capacity/table/cells'
import { cellNumber, COMMENT_LINE, DELIMITER_CHARACTER } from '#shared/heat-capacity/table/cells'

/**
 * Cuts a line into cells. Quoted cells are the library's work; lines without a quote, nearly all, are cut directly.
 *
 * @param line without its end
 * @param delimiter what parts the cells
 */
export function cellsOf(line: string, delimiter: TableDialect['delimiter']): string[] {
  if (delimiter === 'space') return line.trim().split(/\s+/)
  const character = DELIMITER_CHARACTER[delimiter]
  if (!line.includes('"')) return line.split(character)
  return Papa.parse<string[]>(line, { delimiter: character, header: false }).data[0] ?? ['']
}

/** Order of trial: the first of equals wins, so that `1;2` is never read as one cell of blanks. */
const DELIMITERS = ['tab', 'semicolon', 'bar', 'comma', 'space'] as const

const DECIMALS: Readonly<Record<TableDialect['delimiter'], readonly TableDialect['decimal'][]>> = {
  tab: ['point', 'comma'], semicolon: ['point', 'comma'], bar: ['point', 'comma'], space: ['point', 'comma'], comma: ['point'],
}

/**
 * Finds out how a table parts its cells and writes its decimals, from its first lines: the way in which most lines are rows of the
 * same number of numeric cells.
 *
 * @param lines first lines of the file, comments and blank ones among them
 * @returns delimiter and decimal mark
 * @throws DomainError when no way makes a table, or decimal and separating commas cannot be told apart
 */
export function findDialect(lines: readonly string[]): TableDialect {
  const candidates = lines.filter(line => line.trim() !== '' && !COMMENT_LINE.test(line))
  let best: { dialect: TableDialect, score: number } | undefined
  for (const delimiter of DELIMITERS) {
    for (const decimal of DECIMALS[delimiter]) {
      const score = scoreOf(candidates, { delimiter, decimal })
      if (score > (best?.score ?? 0)) best = { dialect: { delimiter, decimal }, score }
    }
  }
  if (!best) {
    throw new DomainError('invalid', candidates.length === 0
      ? 'The file holds no rows, only blank lines or comments. Choose the file with the measured table.'
      : 'This is no table: no line holds two numbers side by side. Upload a text table with a column of temperatures and one of heat capacities.', ['file'])
  }
  if (best.dialect.delimiter === 'comma') refuseTwofoldCommas(candidates)
  return best.dialect
}

/** Lines that are rows of numbers, weighted by the share of their cells that are; two numbers at least make a row. */
function scoreOf(lines: readonly string[], dialect: TableDialect): number {
  let score = 0
  const widths = new Map<number, number>()
  for (const line of lines) {
    const cells = cellsOf(line, dialect.delimiter)
    const numeric = cells.filter(cell => !Number.isNaN(cellNumber(cell, dialect.decimal))).length
    if (numeric < 2) continue
    const filled = cells.filter(cell => cell.trim() !== '').length
    score += numeric / filled
    widths.set(cells.length, (widths.get(cells.length) ?? 0) + 1)
  }
  const rows = [...widths.values()].reduce((sum, count) => sum + count, 0)
  return rows === 0 ? 0 : score * Math.max(...widths.values()) / rows
}

/** `1,83,0,143` under a head of two columns: four cells, or two numbers with decimal commas? Nobody can tell. */
function refuseTwofoldCommas(lines: readonly string[]): void {
  const rowAt = lines.findIndex(line => line.split(',').filter(cell => !Number.isNaN(cellNumber(cell, 'point'))).length >= 2)
  const head = lines[rowAt - 1]
  const row = lines[rowAt]
  if (head === undefined || row === undefined) return
  const heads = cellsOf(head, 'comma').length
  const cells = cellsOf(row, 'comma')
  if (heads > 1 && cells.length === 2 * heads && cells.every(cell => /^\s*[+-]?\d+([eE][+-]?\d+)?\s*$/.test(cell))) {
    throw new DomainError('invalid', `The rows have ${cells.length} cells under ${heads} heads: commas seem to part both cells and decimals. Save the table with semicolons, or with decimal points.`, ['file', rowAt + 1])
  }
}
