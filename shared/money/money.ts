import { DomainError } from '#shared/errors'

/** An amount in whole minor units of a currency (ISO 4217). */
export interface Money {
  readonly amount: number
  readonly currency: string
}

/** Currencies whose minor unit is not a hundredth (ISO 4217, table A.1). */
const EXPONENTS: Readonly<Record<string, number>> = {
  BIF: 0, CLP: 0, DJF: 0, GNF: 0, ISK: 0, JPY: 0, KMF: 0, KRW: 0, PYG: 0, RWF: 0, UGX: 0, VND: 0, VUV: 0, XAF: 0, XOF: 0, XPF: 0,
  BHD: 3, IQD: 3, JOD: 3, KWD: 3, LYD: 3, OMR: 3, TND: 3,
}

/** Decimal places of a currency's minor unit. */
export function currencyExponent(currency: string): number {
  return EXPONENTS[currency] ?? 2
}

/**
 * Rounds half away from zero, as invoices are rounded.
 *
 * @param value any finite number; one a few units of the last binary place under a half counts as a half, since
 *   1.005 × 100 is 100.49999…
 */
export function roundHalfAwayFromZero(value: number): number {
  // A whole number stays as it is: adding a half to a large one would already change it.
  if (Number.isInteger(value)) return value + 0
  const size = Math.abs(value)
  const tolerance = Math.min(1e-3, 1e-9 + 4 * Number.EPSILON * size)
  const rounded = Math.floor(size + 0.5 + tolerance)
  return value < 0 ? -rounded + 0 : rounded
}

/**
 * Price times quantity, rounded once.
 *
 * @param priceMinor price of one unit, minor units
 * @param quantity how many units, any finite number
 * @returns minor units
 * @throws DomainError when the product is no amount of money
 */
export function multiplyPrice(priceMinor: number, quantity: number): number {
  const amount = roundHalfAwayFromZero(priceMinor * quantity)
  if (!Number.isSafeInteger(amount)) throw new DomainError('invalid', 'This amount is too large to be charged. Check the quantity.', ['quantity'])
  return amount
}

/**
 * A share of an amount in basis points (1 % is 100), rounded half away from zero.
 *
 * @param amountMinor minor units
 * @param basisPoints hundredths of a percent
 */
export function shareOf(amountMinor: number, basisPoints: number): number {
  return roundHalfAwayFromZero(amountMinor * basisPoints / 10_000)
}

/**
 * Splits a total over weights without losing a unit (largest remainders).
 *
 * @param totalMinor minor units, may be negative
 * @param weights one or more numbers of zero or more, not all zero
 * @returns parts that add up to the total exactly
 * @throws DomainError when there is nothing to split over
 */
export function allocate(totalMinor: number, weights: readonly number[]): number[] {
  const sum = weights.reduce((total, weight) => total + weight, 0)
  if (!(sum > 0) || !Number.isFinite(sum) || weights.some(weight => weight < 0)) throw new DomainError('invalid', 'An amount can only be split over shares of zero or more, of which one is above zero.', ['weights'])
  const sign = totalMinor < 0 ? -1 : 1
  const exact = weights.map(weight => Math.abs(totalMinor) * weight / sum)
  const parts = exact.map(Math.floor)
  const left = Math.abs(totalMinor) - parts.reduce((total, part) => total + part, 0)
  const byRemainder = exact.map((value, index) => ({ index, remainder: value - Math.floor(value) })).sort((a, b) => b.remainder - a.remainder || a.index - b.index)
  // In amounts near 2⁵³ a product may come out a unit high: then units are taken back, from the smallest remainders.
  const takers = left >= 0 ? byRemainder : byRemainder.reverse().filter(({ index }) => parts[index] !== 0)
  for (const { index } of takers.slice(0, Math.abs(left))) parts[index] = (parts[index] ?? 0) + Math.sign(left)
  return parts.map(part => part * sign + 0)
}

/**
 * Reads an amount as people type it: `2 310,50`, `2,310.50`, `2310`.
 *
 * @param text as typed
 * @param currency ISO 4217 code, which decides the decimal places
 * @returns the amount
 * @throws DomainError saying what to type instead
 */
export function parseMoney(text: string, currency: string): Money {
  const exponent = currencyExponent(currency)
  const compact = text.replace(/[\s\u2009\u202F\u00A0']/g, '').replace('−', '-')
  const [, minus, digits = '', decimals = ''] = (exponent > 0 ? withDecimals(exponent).exec(compact) : null) ?? WHOLE.exec(compact) ?? []
  const size = Number(digits.replace(/[.,]/g, '')) * 10 ** exponent + Number(decimals.padEnd(exponent, '0'))
  if (digits === '' || !Number.isSafeInteger(size)) {
    const example = exponent === 0 ? '2310' : `2310.${'50'.padEnd(exponent, '0')}`
    throw new DomainError('invalid', `"${text}" is not an amount in ${currency}. Enter a number such as ${example}.`)
  }
  return { amount: (minus === '-' ? -size : size) + 0, currency }
}

// Thousands are grouped by one mark throughout, and a group never begins with a zero: 0.005 is no five.
const POINTS = '[1-9]\\d{0,2}(?:\\.\\d{3})+'
const COMMAS = '[1-9]\\d{0,2}(?:,\\d{3})+'
const WHOLE = new RegExp(`^(-?)(\\d+|${POINTS}|${COMMAS})$`)

/** The last mark is the decimal sign when no more digits follow it than the currency has, and it groups nothing before. */
function withDecimals(exponent: number): RegExp {
  return new RegExp(`^(-?)(\\d+|${POINTS}(?=,)|${COMMAS}(?=\\.))[.,](\\d{1,${exponent}})$`)
}
