import type { PackedRows } from '#shared/types/results'

/**
 * Lines of the file in the order of the curve, as they are kept: a sweep that rises line by line needs only its first line.
 *
 * @param rowNumbers line of each point, from 1
 */
export function packRows(rowNumbers: readonly number[]): PackedRows {
  const first = rowNumbers[0] ?? 1
  return rowNumbers.every((row, index) => row === first + index) ? { first } : [...rowNumbers]
}

/**
 * The opposite of `packRows`.
 *
 * @param packed as kept; undefined for computed curves
 * @param pointCount points of the curve
 */
export function unpackRows(packed: PackedRows | undefined, pointCount: number): number[] | undefined {
  if (!packed) return undefined
  return 'first' in packed ? Array.from({ length: pointCount }, (_, index) => packed.first + index) : [...packed]
}
