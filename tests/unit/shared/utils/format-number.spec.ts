import { describe, expect, it } from 'vitest'
import { formatLitres, formatNumber, formatQuantity } from '#shared/utils/format-number'

// U+2009 thin space, U+2212 minus, U+2013 dash.
describe('a number for people', () => {
  it.each([
    [0, 0, '0'], [999, 0, '999'], [1000, 0, '1\u2009000'], [1234567.891, 2, '1\u2009234\u2009567.89'], [12345.6789, 4, '12\u2009345.6789'],
    [-4.2, 1, '\u22124.2'], [-1234, 0, '\u22121\u2009234'],
    // What rounds to nothing has no sign.
    [-0.04, 1, '0.0'], [-0, 0, '0'], [-0.05, 1, '\u22120.1'],
    [Number.NaN, 2, '\u2013'], [Infinity, 0, '\u2013'], [-Infinity, 0, '\u2013'],
  ])('%d with %i decimals is %j', (value, decimals, text) => {
    expect(formatNumber(value, decimals)).toBe(text)
  })
})

describe('a quantity for people', () => {
  it('has a thin space before its unit', () => {
    expect(formatQuantity(93.46, 'L')).toBe('93.5\u2009L')
    expect(formatQuantity(-1234.5, 'mJ/(mol K)', 2)).toBe('\u22121\u2009234.50\u2009mJ/(mol K)')
  })

  it.each([[93.46, '93.5\u2009L'], [0, '0.0\u2009L'], [99.94, '99.9\u2009L'], [99.95, '100\u2009L'], [123.4, '123\u2009L'], [-3.2, '\u22123.2\u2009L'], [1250, '1\u2009250\u2009L']])('of %d litres is %j', (litres, text) => {
    expect(formatLitres(litres)).toBe(text)
  })
})
