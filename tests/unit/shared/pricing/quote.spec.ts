import { describe, expect, it } from 'vitest'
import { plannedQuantities, quoteRun, vatOn } from '#shared/pricing/quote'
import { PRICES } from './builders'

const ESTIMATE = { totalHours: { low: 60, likely: 72, high: 90 }, totalHeliumLitres: { low: 40, likely: 50, high: 65 } }
const FACTS = { prices: PRICES, groupClass: 'academic' as const, reverseCharge: false, depositPercent: 30, sampleCount: 2, recoveryFraction: 0.8 }

describe('what a run is planned to use', () => {
  it('is taken at one point of the interval', () => {
    // 90 h / 24 = 3.75 d; 65 L × 0.8 = 52 L; 3 h + 2 × 0.5 h = 4 h.
    expect(plannedQuantities(ESTIMATE, FACTS, 'high')).toEqual({ cooldowns: 1, cryostatDays: 3.75, heliumLitres: 65, recoveredLitres: 52, operatorHours: 4, mountings: 2 })
  })
})

describe('a quote', () => {
  it('is itemised for the likely case and has three totals with VAT', () => {
    const quote = quoteRun(ESTIMATE, FACTS)
    // Likely: 320 + 3 d × 160 + 50 L × 11.50 − 40 L × 4.50 + 4 h × 65 + 2 × 50 = 320 + 480 + 575 − 180 + 260 + 100 = 1555.
    expect(quote.lines.map(({ netMinor }) => netMinor)).toEqual([320_00, 480_00, 575_00, -180_00, 260_00, 100_00])
    expect(quote.netMinor).toBe(1555_00)
    expect(quote.vatMinor).toBe(388_75) // 25 % of 1555
    expect(quote.totalMinor).toEqual({
      low: 1745_00, // 320 + 400 + 460 − 144 + 260 + 100 = 1396, and 349 VAT
      likely: 1943_75,
      high: 2241_88, // 320 + 600 + 747.50 − 234 + 260 + 100 = 1793.50, and 448.375 → 448.38 VAT
    })
    expect(quote.depositMinor).toBe(583_13) // 30 % of 1943.75 = 583.125
    expect(quote).toMatchObject({ vatBasisPoints: 2500, reverseCharge: false })
  })

  it('has no VAT under reverse charge, and keeps the rate for the paper', () => {
    const quote = quoteRun(ESTIMATE, { ...FACTS, groupClass: 'industry', reverseCharge: true })
    expect(quote).toMatchObject({ vatMinor: 0, vatBasisPoints: 2500, reverseCharge: true, netMinor: 1555_00, totalMinor: { low: 1396_00, likely: 1555_00, high: 1793_50 } })
    expect(quote.depositMinor).toBe(466_50) // 30 % of 1555
  })

  it('asks no deposit of an internal group', () => {
    expect(quoteRun(ESTIMATE, { ...FACTS, groupClass: 'internal' }).depositMinor).toBe(0)
    expect(quoteRun(ESTIMATE, { ...FACTS, groupClass: 'industry' }).depositMinor).toBe(583_13)
  })

  it('is made up to the minimum charge in each case of its own', () => {
    // Minimum 1500: low 1396 is made up to 1500 (and 375 VAT), likely 1555 and high 1793.50 are not.
    const quote = quoteRun(ESTIMATE, { ...FACTS, prices: { ...PRICES, minimumMinor: 1500_00 } })
    expect(quote.totalMinor).toEqual({ low: 1875_00, likely: 1943_75, high: 2241_88 })
    expect(quote.lines.some(({ kind }) => kind === 'minimum')).toBe(false)
  })

  it('stays in order where the credit for helium is above its price', () => {
    // Credit 20.00: low 320 + 400 + 460 − 640 + 360 = 900; likely 320 + 480 + 575 − 800 + 360 = 935; high 320 + 600 + 747.50 − 1040 + 360 = 987.50.
    expect(quoteRun(ESTIMATE, { ...FACTS, reverseCharge: true, prices: { ...PRICES, recoveryCreditPerLitreMinor: 20_00 } }).totalMinor).toEqual({ low: 900_00, likely: 935_00, high: 987_50 })
    // Same hours in all cases: 320 + 480 + 360 = 1160 and per litre 11.50 − 0.8 × 20 = −4.50: 980, 935 and 867.50 for 40, 50 and 65 L.
    const quote = quoteRun({ ...ESTIMATE, totalHours: { low: 72, likely: 72, high: 72 } }, { ...FACTS, reverseCharge: true, prices: { ...PRICES, recoveryCreditPerLitreMinor: 20_00 } })
    expect(quote.totalMinor).toEqual({ low: 867_50, likely: 935_00, high: 980_00 })
  })
})

describe('VAT', () => {
  it.each([[1555_00, 2500, false, 388_75], [1555_00, 2500, true, 0], [1555_00, 0, false, 0], [2, 2500, false, 1]])('on %i at %i, reverse charge %s, is %i', (net, rate, reverse, vat) => {
    expect(vatOn(net, rate, reverse)).toBe(vat)
  })
})
