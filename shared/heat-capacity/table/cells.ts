/** How a table writes its numbers and parts its cells. */
export interface TableDialect {
  readonly delimiter: 'comma' | 'semicolon' | 'tab' | 'space' | 'bar'
  readonly decimal: 'point' | 'comma'
}

/** The character of each delimiter; `space` stands for any run of blanks. */
export const DELIMITER_CHARACTER = { comma: ',', semicolon: ';', tab: '\t', bar: '|', space: ' ' } as const

/**
 * The number a cell holds.
 *
 * @param cell as it stands in the file
 * @param decimal which mark parts the fraction
 * @returns the number, or NaN for anything else: an empty cell, a word, two decimal marks, hexadecimal, infinity
 */
export function cellNumber(cell: string, decimal: TableDialect['decimal']): number {
  let text = cell.trim()
  if (text === '') return Number.NaN
  if (decimal === 'comma' && text.includes(',')) {
    if (text.includes('.')) return Number.NaN
    text = text.replace(',', '.')
  }
  const value = Number(text)
  if (Number.isFinite(value)) return text.charCodeAt(1) > 57 && /^0[xbo]/i.test(text) ? Number.NaN : value
  // A true minus, and the exponent that Fortran writes: 1.2D-03.
  const mended = text.replace(/[−–]/g, '-').replace(/^([+-]?[\d.]+)[dD]([+-]?\d+)$/, '$1e$2')
  if (mended === text || !/^[+-]?(\d|\.\d)/.test(mended)) return Number.NaN
  return Number(mended)
}

/** Marks that begin a comment line. */
export const COMMENT_LINE = /^\s*(#|%|\/\/|!)/
