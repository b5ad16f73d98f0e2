import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { currencyExponent } from '#shared/money/money'
import { formatDuration } from '#shared/utils/format-duration'
import { formatMoney } from '#shared/utils/format-money'
import { formatLitres, formatNumber, formatQuantity } from '#shared/utils/format-number'
import { formatTemperature, formatTemperatureShort } from '#shared/utils/format-temperature'

// Written with plain spaces here; thin ones (U+2009) and the one after a currency's sign (U+00A0) are looked at once below.
const plain = (text: string) => text.replace(/[\u2009\u00A0]/g, ' ')

describe('numbers', () => {
  it('sets thin spaces between thousands and a true minus', () => {
    expect(formatNumber(1234567)).toBe('1\u2009234\u2009567')
    expect(formatNumber(-1234.5, 2)).toBe('\u22121\u2009234.50')
    expect(formatQuantity(93.5, 'L')).toBe('93.5\u2009L')
  })
  it.each([
    [0, 0, '0'], [999, 0, '999'], [1000, 0, '1 000'], [-0.04, 1, '0.0'], [-0.05, 1, '−0.1'], [0.12345, 3, '0.123'], [1234.5678, 4, '1 234.5678'], [999.95, 1, '1 000.0'],
    [Number.NaN, 0, '–'], [Infinity, 0, '–'],
  ])('%d to %i places is %s', (value, decimals, text) => {
    expect(plain(formatNumber(value, decimals))).toBe(text)
  })
  it.each([[0, '0.0 L'], [93.54, '93.5 L'], [99.94, '99.9 L'], [99.96, '100 L'], [1234.6, '1 235 L'], [-12.34, '−12.3 L']])('%d litres are %s', (litres, text) => {
    expect(plain(formatLitres(litres))).toBe(text)
  })
})

describe('money', () => {
  it('keeps sign and number of a currency together', () => {
    expect(formatMoney({ amount: 2310_00, currency: 'EUR' })).toBe('€\u00A02\u2009310.00')
  })
  it.each([
    [0, 'EUR', '€ 0.00'], [5, 'EUR', '€ 0.05'], [-432_44, 'EUR', '−€ 432.44'], [1_234_567_89, 'GBP', '£ 1 234 567.89'],
    // ISO 4217: the yen has no minor unit, the Kuwaiti dinar a thousandth.
    [2310, 'JPY', '¥ 2 310'], [2_310_500, 'KWD', 'KWD 2 310.500'], [100, 'NOK', 'NOK 1.00'],
  ])('%i of %s is %s', (amount, currency, text) => {
    expect(plain(formatMoney({ amount, currency }))).toBe(text)
  })
  it('shows every amount digit for digit', () => {
    fc.assert(fc.property(fc.integer({ min: -1e13, max: 1e13 }), fc.constantFrom('EUR', 'JPY', 'KWD'), (amount, currency) => {
      const shown = formatMoney({ amount, currency })
      expect(shown.includes('−')).toBe(amount < 0)
      expect(shown.replace(/\D/g, '')).toBe(String(Math.abs(amount)).padStart(currencyExponent(currency) + 1, '0'))
    }))
  })
})

describe('durations', () => {
  const MIN = 60
  const H = 3600
  const D = 86_400
  it.each([
    [3 * D + 4 * H, '3 d 4 h'], [5 * H + 20 * MIN, '5 h 20 min'], [28 * MIN, '28 min'], [2 * H, '2 h'], [D, '1 d'], [0, '0 min'], [29, '0 min'], [30, '1 min'],
    [23 * H + 59 * MIN, '23 h 59 min'], [23 * H + 59.6 * MIN, '1 d'], [D + 23.5 * H, '2 d'], [D + 23.4 * H, '1 d 23 h'], [-2 * H, '−2 h'], [-10, '0 min'],
  ])('%d s is %s', (durationS, text) => {
    expect(plain(formatDuration(durationS))).toBe(text)
  })
})

describe('temperatures', () => {
  it.each([[1.552, '1.552 K'], [0.02, '20 mK'], [0.0085, '8.5 mK'], [300, '300 K'], [4.2, '4.200 K'], [77.35, '77.35 K'], [0.35, '0.350 K'], [0.0996, '100 mK'], [0.1, '0.100 K']])('%d K is %s', (temperatureK, text) => {
    expect(plain(formatTemperature(temperatureK))).toBe(text)
  })
  it.each([[0.3, '0.3 K'], [4.2, '4.2 K'], [0.02, '20 mK'], [300, '300 K'], [1.25, '1.25 K'], [0.007, '7 mK']])('%d K as a label is %s', (temperatureK, text) => {
    expect(plain(formatTemperatureShort(temperatureK))).toBe(text)
  })
})
