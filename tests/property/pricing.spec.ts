import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { besideEstimate, invoiceAmounts } from '#shared/pricing/invoice'
import { type ChargeQuantities, netOf, priceLines } from '#shared/pricing/lines'
import { quoteRun } from '#shared/pricing/quote'
import { type ClassPrices, GROUP_CLASSES } from '#shared/pricing/rate-card'
import { DEFAULT_REFUND_LADDER, refundOf } from '#shared/pricing/refund-ladder'

const minor = fc.integer({ min: 0, max: 200_000 })
const amount = fc.double({ min: 0, max: 500, noNaN: true })
const vatBasisPoints = fc.integer({ min: 0, max: 3000 })
const prices: fc.Arbitrary<ClassPrices> = fc.record({
  perCooldownMinor: minor, perDayMinor: minor, perLitreMinor: minor, recoveryCreditPerLitreMinor: minor, perOperatorHourMinor: minor,
  perMountingMinor: minor, minimumMinor: minor, vatBasisPoints,
})
const quantities: fc.Arbitrary<ChargeQuantities> = fc.record({
  cooldowns: fc.nat(1), cryostatDays: amount, heliumLitres: amount, recoveredLitres: amount, operatorHours: amount, mountings: fc.nat(6),
})
const interval = fc.tuple(amount, amount, amount).map((values) => {
  const [low = 0, likely = 0, high = 0] = values.sort((a, b) => a - b)
  return { low, likely, high }
})

describe('lines of a run', () => {
  it('reach the minimum charge, and pass it only by what was used', () => {
    fc.assert(fc.property(quantities, prices, (used, card) => {
      const lines = priceLines(used, card)
      const net = netOf(lines)
      expect(net).toBeGreaterThanOrEqual(card.minimumMinor)
      expect(lines.every(line => Number.isSafeInteger(line.netMinor))).toBe(true)
      if (lines.some(({ kind }) => kind === 'minimum')) expect(net).toBe(card.minimumMinor)
      expect(new Set(lines.map(({ kind }) => kind)).size).toBe(lines.length)
    }))
  })

  it('can be redone by hand: each is its printed quantity at its printed price, to half a unit', () => {
    fc.assert(fc.property(quantities, prices, (used, card) => {
      for (const line of priceLines(used, card)) {
        // Quantities have at most two decimals, so hundredths of them are whole numbers.
        const hundredths = Math.round(line.quantity * 100)
        expect(Math.abs(line.quantity * 100 - hundredths)).toBeLessThan(1e-6)
        expect(Math.abs(100 * line.netMinor - hundredths * line.unitPriceMinor)).toBeLessThanOrEqual(50)
      }
    }))
  })
})

describe('a quote', () => {
  const facts = fc.record({ prices, groupClass: fc.constantFrom(...GROUP_CLASSES), reverseCharge: fc.boolean(), depositPercent: fc.integer({ min: 0, max: 100 }), sampleCount: fc.integer({ min: 1, max: 6 }), recoveryFraction: fc.double({ min: 0, max: 1, noNaN: true }) })

  it('has low ≤ likely ≤ high, lines that add up, and a deposit that is no more than the likely total', () => {
    fc.assert(fc.property(interval, interval, facts, (totalHours, totalHeliumLitres, given) => {
      const quote = quoteRun({ totalHours, totalHeliumLitres }, given)
      const { low, likely, high } = quote.totalMinor
      expect(low).toBeLessThanOrEqual(likely)
      expect(likely).toBeLessThanOrEqual(high)
      expect(netOf(quote.lines)).toBe(quote.netMinor)
      expect(quote.netMinor + quote.vatMinor).toBe(likely)
      if (given.reverseCharge) expect(quote.vatMinor).toBe(0)
      expect(quote.depositMinor).toBeLessThanOrEqual(likely)
      if (given.groupClass === 'internal') expect(quote.depositMinor).toBe(0)
      else expect(Math.abs(100 * quote.depositMinor - likely * given.depositPercent)).toBeLessThanOrEqual(50)
    }))
  })
})

describe('an invoice', () => {
  // Rules of EN 16931-1:2017, as published in its validation artefacts (from memory).
  it('obeys BR-CO-10, -13, -15, -16 and -17', () => {
    fc.assert(fc.property(quantities, prices, fc.boolean(), minor, (used, card, reverseCharge, prepaidMinor) => {
      const lines = priceLines(used, card)
      const sum = invoiceAmounts(lines, { vatBasisPoints: card.vatBasisPoints, reverseCharge }, prepaidMinor)
      // BR-CO-10: BT-106 is the sum of the lines' net amounts; BR-CO-13: BT-109 is BT-106, as nothing is allowed or charged on the whole.
      expect(sum.netMinor).toBe(lines.reduce((total, line) => total + line.netMinor, 0))
      // BR-CO-17: BT-117 is the category's base times its rate, to two decimals. Whole-number arithmetic, half up.
      const rate = reverseCharge ? 0n : BigInt(card.vatBasisPoints)
      expect(sum.vatMinor).toBe(Number((2n * BigInt(sum.netMinor) * rate + 10_000n) / 20_000n))
      // BR-CO-15: BT-112 is BT-109 + BT-110. BR-CO-16: BT-115 is BT-112 − BT-113.
      expect(sum.totalMinor).toBe(sum.netMinor + sum.vatMinor)
      expect(sum.dueMinor).toBe(sum.totalMinor - sum.prepaidMinor)
      expect(sum.prepaidMinor).toBe(prepaidMinor)
    }))
  })

  it('changes no amount by setting the estimate beside it, and loses nothing of the estimate', () => {
    fc.assert(fc.property(quantities, quantities, prices, (used, planned, card) => {
      const [actual, estimated] = [priceLines(used, card), priceLines(planned, card)]
      const beside = besideEstimate(actual, estimated)
      expect(netOf(beside)).toBe(netOf(actual))
      expect(beside.reduce((sum, line) => sum + (line.estimatedNetMinor ?? 0), 0)).toBe(netOf(estimated))
      expect(new Set(beside.map(({ kind }) => kind)).size).toBe(beside.length)
    }))
  })
})

describe('a refund', () => {
  it('never grows with waiting, and never passes the deposit', () => {
    const HOUR = 3_600_000
    // Starts through two years, so that both changes of the clock lie between.
    fc.assert(fc.property(fc.integer({ min: 0, max: 17_520 }), fc.nat(600), fc.nat(600), minor, (startH, first, second, depositMinor) => {
      const startsAt = new Date(Date.UTC(2027, 0, 1) + startH * HOUR)
      const refund = (hoursBefore: number) => refundOf(depositMinor, new Date(startsAt.getTime() - hoursBefore * HOUR), startsAt, 'Europe/Oslo')
      const [early, late] = [refund(Math.max(first, second)), refund(Math.min(first, second))]
      expect(early.amountMinor).toBeGreaterThanOrEqual(late.amountMinor)
      expect(early.amountMinor).toBeLessThanOrEqual(depositMinor)
      expect(DEFAULT_REFUND_LADDER.map(step => step.refundPercent)).toContain(late.percent)
      // Whatever the clock does, 15 days of 24 h are 14 on the calendar, and under 3 days less an hour are not 3.
      if (Math.max(first, second) >= 15 * 24) expect(early.percent).toBe(100)
      if (Math.min(first, second) < 71) expect(late.percent).toBe(0)
    }))
  })
})
