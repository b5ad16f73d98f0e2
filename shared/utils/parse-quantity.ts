// Digits, at most one decimal mark, an optional exponent. Number() alone would take "" and "0x10".
const DECIMAL = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?$/i

/**
 * A number as a person types it: a decimal comma or point, spaces between thousands, a true minus.
 *
 * @param typed what stands in the field
 * @returns the number; null when the field is empty; undefined when it is no number
 */
export function parseQuantity(typed: string): number | null | undefined {
  const plain = typed.replace(/\s/g, '').replace('\u2212', '-').replace(',', '.')
  if (plain === '') return null
  const number = DECIMAL.test(plain) ? Number(plain) : Number.NaN
  return Number.isFinite(number) ? number : undefined
}
