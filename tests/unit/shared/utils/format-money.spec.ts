import { describe, expect, it } from 'vitest'
import { formatMoney } from '#shared/utils/format-money'

describe('an amount for people', () => {
  // Symbol, U+00A0 so that a line never breaks there, thousands by U+2009, minus U+2212 before the symbol.
  it.each([
    [2310_00, 'EUR', '\u20AC\u00A02\u2009310.00'],
    [5, 'EUR', '\u20AC\u00A00.05'],
    [0, 'EUR', '\u20AC\u00A00.00'],
    [-1234_56, 'EUR', '\u2212\u20AC\u00A01\u2009234.56'],
    [1_234_567_89, 'GBP', '\u00A3\u00A01\u2009234\u2009567.89'],
    [1_00, 'USD', 'US$\u00A01.00'],
    [1234, 'JPY', '\u00A5\u00A01\u2009234'],
    [1_234_567, 'KWD', 'KWD\u00A01\u2009234.567'],
    [2310_00, 'NOK', 'NOK\u00A02\u2009310.00'],
  ])('%i in %s is %j', (amount, currency, text) => {
    expect(formatMoney({ amount, currency })).toBe(text)
  })
})
