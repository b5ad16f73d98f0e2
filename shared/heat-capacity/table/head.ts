import { cellNumber, COMMENT_LINE } from '#shared/heat-capacity/table/cells'
import type { TableDialect } from '#shared/heat-capacity/table/cells'
import { cellsOf } from '#shared/heat-capacity/table/dialect'
import { readColumnHead } from '#shared/units/column-heads'
import type { HeatCapacityUnit, TemperatureUnit } from '#shared/units/heat-capacity-units'
import { parseHeatCapacityUnit, parseTemperatureUnit } from '#shared/units/heat-capacity-units'

/** Where the head of a table stands, and where its data begin. Lines count from 0. */
export interface TableHead {
  readonly heads: readonly string[]
  /** Line of the head; undefined when the table has none. */
  readonly line?: number
  readonly firstDataLine: number
}

/**
 * Finds the head: the line of words just above the first row of numbers, which may be a comment, with a line of units under it.
 *
 * @param lines first lines of the file
 * @param dialect how they are written
 */
export function findHead(lines: readonly string[], dialect: TableDialect): TableHead {
  const firstDataLine = Math.max(0, lines.findIndex(line => !COMMENT_LINE.test(line) && numbersIn(line, dialect) >= 2))
  const width = cellsOf(lines[firstDataLine] ?? '', dialect.delimiter).length
  const above = lines.slice(0, firstDataLine).map((line, index) => ({ line: index, cells: wordsOf(line, dialect, width) })).filter(row => row.cells.some(cell => cell !== ''))
  const last = above.at(-1)
  if (!last || last.cells.length < 2) return { heads: Array.from({ length: width }, (_, column) => `Column ${column + 1}`), firstDataLine }
  const before = above.at(-2)
  if (before?.cells.length === last.cells.length && last.cells.every(isUnit)) {
    return { heads: before.cells.map((cell, column) => last.cells[column] ? `${cell} (${bare(last.cells[column])})` : cell), line: before.line, firstDataLine }
  }
  return { heads: last.cells, line: last.line, firstDataLine }
}

function numbersIn(line: string, dialect: TableDialect): number {
  return cellsOf(line, dialect.delimiter).filter(cell => !Number.isNaN(cellNumber(cell, dialect.decimal))).length
}

/** Heads of a table parted by blanks may hold blanks themselves: then two or more part them, or a single one if the count fits. */
function wordsOf(line: string, dialect: TableDialect, width: number): string[] {
  const text = line.replace(COMMENT_LINE, '')
  const cells = (each: string[]) => each.map(cell => cell.trim())
  if (dialect.delimiter !== 'space') return cells(cellsOf(text, dialect.delimiter))
  const wide = cells(text.trim().split(/\s{2,}|\t/))
  return wide.length === width ? wide : cells(text.trim().split(/\s+/))
}

function bare(unit: string): string {
  return unit.replace(/^[([](.*)[)\]]$/, '$1')
}

function isUnit(cell: string): boolean {
  return cell === '' || /^%$/.test(bare(cell)) || parseTemperatureUnit(bare(cell)) !== undefined || parseHeatCapacityUnit(cell) !== undefined
}

/** Which columns hold what, as far as the heads say; a unit is absent where they do not. */
export interface SuggestedMapping {
  readonly temperature?: { readonly column: number, readonly unit?: TemperatureUnit }
  readonly heatCapacity?: { readonly column: number, readonly unit?: HeatCapacityUnit }
  readonly sigma?: { readonly column: number, readonly unit?: HeatCapacityUnit | '%' }
}

/**
 * Suggests the mapping of columns from their heads. Of several temperatures the sample's is taken, else the first.
 *
 * @param heads heads in the order of the columns
 */
export function suggestMapping(heads: readonly string[]): SuggestedMapping {
  const read = heads.map((head, column) => ({ column, head, ...readColumnHead(head) }))
  const best = <Q extends 'temperature' | 'heatCapacity' | 'sigma'>(quantity: Q) => {
    const found = read.filter((each): each is typeof each & { quantity: Q } => each.quantity === quantity)
    const chosen = found.find(each => each.unit && /samp/i.test(each.head)) ?? found.find(each => each.unit) ?? found[0]
    return chosen && { column: chosen.column, unit: chosen.unit }
  }
  return { temperature: best('temperature') as SuggestedMapping['temperature'], heatCapacity: best('heatCapacity') as SuggestedMapping['heatCapacity'], sigma: best('sigma') as SuggestedMapping['sigma'] }
}
