import { describe, expect, it } from 'vitest'
import { DomainError } from '#shared/errors'
import { allocate, currencyExponent, multiplyPrice, parseMoney, roundHalfAwayFromZero, shareOf } from '#shared/money/money'

describe('the minor unit of a currency', () => {
  // ISO 4217:2015, table A.1: minor units of EUR 2, JPY 0, KWD 3.
  it.each([['EUR', 2], ['NOK', 2], ['JPY', 0], ['KWD', 3]])('%s has %i decimal places', (currency, places) => {
    expect(currencyExponent(currency)).toBe(places)
  })
})

describe('rounding half away from zero', () => {
  it.each([
    [0.5, 1], [-0.5, -1], [1.5, 2], [2.5, 3], [-2.5, -3],
    [0.49, 0], [-0.49, 0], [2.4999, 2], [2.51, 3],
    // Binary doubles put these just under the half: 1.005 × 100 is 100.49999999999999, by hand 100.5 → 101.
    [1.005 * 100, 101], [-1.005 * 100, -101],
    // 8.165 × 100 is 816.4999999999999, by hand 816.5 → 817; 1.115 × 100 is 111.50000000000001 → 112.
    [8.165 * 100, 817], [1.115 * 100, 112],
    // Whole numbers stay, also large ones.
    [0, 0], [-0, 0], [7, 7], [1e12, 1e12], [-3e15, -3e15], [Number.MAX_SAFE_INTEGER, Number.MAX_SAFE_INTEGER],
    // A large amount with a plain fraction: 5 × 10¹¹ + 0.25 rounds down.
    [5e11 + 0.25, 5e11], [5e11 + 0.5, 5e11 + 1],
  ])('%d becomes %d', (value, whole) => {
    expect(roundHalfAwayFromZero(value)).toBe(whole)
  })
})

describe('price times quantity', () => {
  it.each([
    [18_50, 93.5, 1729_75], // 18.50 × 93.5 = 1729.75
    [1_05, 0.3, 32], // 1.05 × 0.3 = 0.315 → 0.32
    [-9_00, 61.7, -555_30], // credit: 9.00 × 61.7 = 555.30
    [-1, 0.5, -1], // half a cent of credit, away from zero
    [3_333, 0, 0],
  ])('%i × %d is %i', (price, quantity, amount) => {
    expect(multiplyPrice(price, quantity)).toBe(amount)
  })

  it.each([[1e10, 1e10], [100, Number.NaN], [100, Infinity]])('refuses %d × %d', (price, quantity) => {
    expect(() => multiplyPrice(price, quantity)).toThrow('This amount is too large to be charged. Check the quantity.')
  })
})

describe('a share in basis points', () => {
  it.each([
    [1729_75, 2500, 432_44], // 25 % of 1729.75 = 432.4375 → 432.44
    [2, 2500, 1], // 25 % of 0.02 = 0.005 → 0.01
    [-2, 2500, -1],
    [100_00, 0, 0],
    [12_345, 10_000, 12_345],
  ])('of %i at %i is %i', (amount, basisPoints, share) => {
    expect(shareOf(amount, basisPoints)).toBe(share)
  })
})

describe('splitting an amount', () => {
  it.each([
    [100, [1, 1, 1], [34, 33, 33]], // 33.33 each; the unit left goes to the first of equals
    [-100, [1, 1, 1], [-34, -33, -33]],
    [5, [3, 7], [2, 3]], // 1.5 and 3.5: equal remainders, the first takes the unit
    [10, [1, 6, 3], [1, 6, 3]],
    [1, [0, 0.2, 0.7], [0, 0, 1]], // 0.22 and 0.78: the largest remainder
    [0, [1, 2], [0, 0]],
    [7, [5], [7]],
  ])('%i over %j is %j', (total, weights, parts) => {
    expect(allocate(total, weights)).toEqual(parts)
  })

  it.each([[[]], [[0, 0]], [[-1, 2]], [[Number.NaN, 1]], [[Infinity, 1]]])('refuses the shares %j', (weights: number[]) => {
    expect(() => allocate(100, weights)).toThrow(DomainError)
    expect(() => allocate(100, weights)).toThrow('An amount can only be split over shares of zero or more, of which one is above zero.')
  })
})

describe('an amount as it is typed', () => {
  it.each([
    ['2310', 'EUR', 2310_00], ['2310.5', 'EUR', 2310_50], ['2310,50', 'EUR', 2310_50],
    ['2 310,50', 'EUR', 2310_50], ['2\u2009310.50', 'EUR', 2310_50], ['2\u202F310.50', 'EUR', 2310_50], ['2\u00A0310.50', 'EUR', 2310_50],
    ['2,310.50', 'EUR', 2310_50], ['2.310,50', 'EUR', 2310_50], ['2\'310.50', 'EUR', 2310_50], ['1,234,567.89', 'EUR', 1_234_567_89],
    ['2,310', 'EUR', 2310_00], ['2.310', 'EUR', 2310_00], ['0.05', 'EUR', 5], ['-12.30', 'EUR', -12_30], ['\u221212.30', 'EUR', -12_30], ['-0', 'EUR', 0],
    ['2310', 'JPY', 2310], ['2,310', 'JPY', 2310], ['2.310', 'JPY', 2310],
    // The dinar has three decimal places, so three digits after the last mark are fils.
    ['2310.500', 'KWD', 2_310_500], ['2.310', 'KWD', 2_310], ['1.005', 'KWD', 1_005], ['2,310.5', 'KWD', 2_310_500], ['2,310,500', 'KWD', 2_310_500_000],
  ])('reads %j in %s', (text, currency, amount) => {
    expect(parseMoney(text, currency)).toEqual({ amount, currency })
  })

  it.each([
    ['', 'EUR', '2310.50'], ['abc', 'EUR', '2310.50'], ['12.345.6', 'EUR', '2310.50'], ['1.2.3', 'EUR', '2310.50'], ['0.005', 'EUR', '2310.50'],
    ['1234.567', 'EUR', '2310.50'], ['1,234.567', 'EUR', '2310.50'], ['--5', 'EUR', '2310.50'], ['5.', 'EUR', '2310.50'], ['€ 5', 'EUR', '2310.50'],
    ['1e3', 'EUR', '2310.50'], ['99999999999999999', 'EUR', '2310.50'],
    ['2310.5', 'JPY', '2310'], ['1.0005', 'KWD', '2310.500'],
  ])('refuses %j in %s and shows how to type it', (text, currency, example) => {
    expect(() => parseMoney(text, currency)).toThrow(`"${text}" is not an amount in ${currency}. Enter a number such as ${example}.`)
  })

  it('shows an example that it reads itself', () => {
    expect(parseMoney('2310.500', 'KWD').amount).toBe(2_310_500) // 2310 dinars and 500 fils
  })
})
