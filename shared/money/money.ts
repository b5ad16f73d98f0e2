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
 * @param value any finite number; one within a billionth of a half counts as a half, since 1.005 × 100 is 100.49999…
 */
export function roundHalfAwayFromZero(value: number): number {
  const size = Math.abs(value)
  const rounded = Math.floor(size + 0.5 + size * 1e-12 + 1e-9)
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
  if (!(sum > 0) || weights.some(weight => weight < 0)) throw new DomainError('invalid', 'An amount can only be split over shares of zero or more, of which one is above zero.', ['weights'])
  const sign = totalMinor < 0 ? -1 : 1
  const exact = weights.map(weight => Math.abs(totalMinor) * weight / sum)
  const parts = exact.map(Math.floor)
  const left = Math.abs(totalMinor) - parts.reduce((total, part) => total + part, 0)
  const byRemainder = exact.map((value, index) => ({ index, remainder: value - Math.floor(value) })).sort((a, b) => b.remainder - a.remainder || a.index - b.index)
  for (const { index } of byRemainder.slice(0, left)) parts[index] = (parts[index] ?? 0) + 1
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
  // The last comma or point is the decimal sign when no more digits follow it than the currency has.
  const match = /^(-?)(\d{1,3}(?:[.,]?\d{3})*|\d+)(?:[.,](\d{1,3}))?$/.exec(compact)
  const decimals = match?.[3] ?? ''
  if (!match || decimals.length > exponent) {
    const example = exponent === 0 ? '2310' : `2310.${'50'.padEnd(exponent, '0')}`
    throw new DomainError('invalid', `"${text}" is not an amount in ${currency}. Enter a number such as ${example}.`)
  }
  const whole = Number((match[2] ?? '').replace(/[.,]/g, ''))
  const amount = whole * 10 ** exponent + Number(decimals.padEnd(exponent, '0') || 0)
  return { amount: (match[1] === '-' ? -amount : amount) + 0, currency }
}
