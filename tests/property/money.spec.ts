import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { allocate, currencyExponent, parseMoney, roundHalfAwayFromZero, shareOf } from '#shared/money/money'
import { formatMoney } from '#shared/utils/format-money'

const amount = fc.integer({ min: -1e12, max: 1e12 })
const currency = fc.constantFrom('EUR', 'NOK', 'JPY', 'KWD')

describe('rounding half away from zero', () => {
  it('is odd, and never farther than a half from the value', () => {
    fc.assert(fc.property(fc.double({ min: -1e9, max: 1e9, noNaN: true }), (value) => {
      const rounded = roundHalfAwayFromZero(value)
      expect(Number.isInteger(rounded)).toBe(true)
      expect(roundHalfAwayFromZero(-value)).toBe(-rounded + 0)
      // The tolerance under a half is at most 1e-9 and four units of the last place of a thousand million, under 2e-6.
      expect(Math.abs(rounded - value)).toBeLessThanOrEqual(0.5 + 2e-6)
    }))
  })

  it('rounds the hundredths of a decimal price as done by hand on its digits', () => {
    // Whole, hundredths and a third digit: rounded up exactly when the third digit is 5 or more.
    fc.assert(fc.property(fc.integer({ min: 0, max: 1_000_000 }), fc.integer({ min: 0, max: 9 }), (hundredths, third) => {
      const price = Number(`${Math.floor(hundredths / 100)}.${String(hundredths % 100).padStart(2, '0')}${third}`)
      expect(roundHalfAwayFromZero(price * 100)).toBe(hundredths + (third >= 5 ? 1 : 0))
    }))
  })
})

describe('splitting an amount', () => {
  const weights = fc.array(fc.oneof(fc.integer({ min: 0, max: 1000 }), fc.double({ min: 0, max: 1e6, noNaN: true })), { minLength: 1, maxLength: 20 })
    .filter(list => list.some(weight => weight > 1e-6))

  it('never loses a unit', () => {
    fc.assert(fc.property(fc.oneof(amount, fc.maxSafeInteger()), weights, (total, list) => {
      const parts = allocate(total, list)
      expect(parts.reduce((sum, part) => sum + BigInt(part), 0n)).toBe(BigInt(total))
    }), { numRuns: 2000 })
  })

  it('gives each share within a unit of its exact part, and nothing to a share of zero', () => {
    fc.assert(fc.property(fc.integer({ min: -1_000_000, max: 1_000_000 }), weights, (total, list) => {
      const sum = list.reduce((all, weight) => all + weight, 0)
      allocate(total, list).forEach((part, index) => {
        const weight = list[index] ?? 0
        expect(Math.abs(part - total * weight / sum)).toBeLessThan(1 + 1e-6)
        if (weight === 0) expect(part).toBe(0)
      })
    }))
  })
})

describe('a share in basis points', () => {
  it('agrees with whole-number arithmetic', () => {
    // Twice the amount times the rate, plus the divisor, over twice the divisor: rounding half up in integers only.
    fc.assert(fc.property(fc.integer({ min: 0, max: 1e10 }), fc.integer({ min: 0, max: 10_000 }), (size, basisPoints) => {
      const byHand = Number((2n * BigInt(size) * BigInt(basisPoints) + 10_000n) / 20_000n)
      expect(shareOf(size, basisPoints)).toBe(byHand)
      expect(shareOf(-size, basisPoints)).toBe(-byHand + 0)
    }), { numRuns: 1000 })
  })
})

describe('an amount as it is typed', () => {
  it('is read back from what is shown and from what a file holds', () => {
    fc.assert(fc.property(amount, currency, fc.constantFrom('.', ','), (minor, code, mark) => {
      const exponent = currencyExponent(code)
      const digits = String(Math.abs(minor)).padStart(exponent + 1, '0')
      const plain = `${minor < 0 ? '-' : ''}${exponent === 0 ? digits : `${digits.slice(0, -exponent)}${mark}${digits.slice(-exponent)}`}`
      expect(parseMoney(plain, code).amount).toBe(minor)
      const shown = formatMoney({ amount: minor, currency: code }).replace(/[^\d.\u2212\u2009]/g, '')
      expect(parseMoney(shown, code).amount).toBe(minor)
    }))
  })

  it('is read with thousands in one mark and decimals in the other', () => {
    fc.assert(fc.property(fc.integer({ min: 1_000_00, max: 1e12 }), fc.constantFrom([',', '.'], ['.', ','], [' ', ','], ['\'', '.']), (minor, [group, mark]) => {
      const whole = String(Math.floor(minor / 100)).replace(/\B(?=(\d{3})+$)/g, group ?? '')
      expect(parseMoney(`${whole}${mark}${String(minor % 100).padStart(2, '0')}`, 'EUR').amount).toBe(minor)
    }))
  })
})
