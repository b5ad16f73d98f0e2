const MINUS = '\u2212'
const THIN_SPACE = '\u2009'

/**
 * A number for people: thin spaces between thousands, a true minus.
 *
 * @param value any number; one that is not finite is shown as a dash
 * @param decimals decimal places
 */
export function formatNumber(value: number, decimals = 0): string {
  if (!Number.isFinite(value)) return '–'
  const [whole = '', fraction] = Math.abs(value).toFixed(decimals).split('.')
  const grouped = whole.replace(/\B(?=(\d{3})+$)/g, THIN_SPACE)
  const isZero = Number(Math.abs(value).toFixed(decimals)) === 0
  return `${value < 0 && !isZero ? MINUS : ''}${grouped}${fraction ? `.${fraction}` : ''}`
}

/**
 * A quantity with its unit, e.g. `93.5 L`.
 *
 * @param value number in that unit
 * @param unit as printed
 * @param decimals decimal places
 */
export function formatQuantity(value: number, unit: string, decimals = 1): string {
  return `${formatNumber(value, decimals)}${THIN_SPACE}${unit}`
}

/** Litres of liquid helium: one decimal under 100 L, none above. */
export function formatLitres(litres: number): string {
  return formatQuantity(litres, 'L', Math.abs(litres) < 99.95 ? 1 : 0)
}
