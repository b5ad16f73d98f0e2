import { currencyExponent, type Money } from '#shared/money/money'
import { formatNumber } from './format-number'

const SYMBOLS: Readonly<Record<string, string>> = { EUR: '€', GBP: '£', USD: 'US$', JPY: '¥' }

/** An amount for people: `€ 2 310.00`. */
export function formatMoney({ amount, currency }: Money): string {
  const exponent = currencyExponent(currency)
  const text = formatNumber(amount / 10 ** exponent, exponent)
  return text.startsWith('\u2212') ? `\u2212${SYMBOLS[currency] ?? currency}\u00A0${text.slice(1)}` : `${SYMBOLS[currency] ?? currency}\u00A0${text}`
}
