import { describe, expect, it } from 'vitest'
import { besideEstimate, invoiceAmounts } from '#shared/pricing/invoice'
import { priceLines } from '#shared/pricing/lines'
import { PRICES, quantities } from './builders'

describe('actual lines beside the estimated ones', () => {
  it('each carry the estimate of their kind', () => {
    const estimated = priceLines(quantities({ cooldowns: 1, cryostatDays: 3, heliumLitres: 50 }), PRICES)
    const actual = priceLines(quantities({ cooldowns: 1, cryostatDays: 3.5, heliumLitres: 61.2 }), PRICES)
    expect(besideEstimate(actual, estimated).map(line => [line.kind, line.quantity, line.netMinor, line.estimatedQuantity, line.estimatedNetMinor])).toEqual([
      ['cooldown', 1, 320_00, 1, 320_00],
      ['cryostat-day', 3.5, 560_00, 3, 480_00], // 3.5 × 160
      ['helium-litre', 61.2, 703_80, 50, 575_00], // 61.2 × 11.50
    ])
  })

  it('say that nothing was estimated of what was not planned', () => {
    const [line] = besideEstimate(priceLines(quantities({ mountings: 6 }), PRICES), [])
    expect(line).toMatchObject({ kind: 'mounting', netMinor: 300_00, estimatedQuantity: null, estimatedNetMinor: null })
  })

  it('keep estimated lines of which nothing was used, at nothing', () => {
    const estimated = priceLines(quantities({ cooldowns: 1, heliumLitres: 50, recoveredLitres: 40 }), PRICES)
    const beside = besideEstimate(priceLines(quantities({ cooldowns: 1 }), PRICES), estimated)
    expect(beside.map(line => [line.kind, line.quantity, line.netMinor, line.unitPriceMinor, line.estimatedQuantity, line.estimatedNetMinor])).toEqual([
      ['cooldown', 1, 320_00, 320_00, 1, 320_00],
      ['helium-litre', 0, 0, 11_50, 50, 575_00],
      ['recovery-litre', 0, 0, -4_50, 40, -180_00],
    ])
  })

  it('keep an estimated making-up too, so that the estimates add up to the quote', () => {
    const estimated = priceLines(quantities({ cryostatDays: 1 }), PRICES) // 160 made up by 90 to 250
    const beside = besideEstimate(priceLines(quantities({ cryostatDays: 2 }), PRICES), estimated) // 320
    expect(beside.map(line => [line.kind, line.netMinor, line.estimatedNetMinor])).toEqual([['cryostat-day', 320_00, 160_00], ['minimum', 0, 90_00]])
  })
})

describe('the amounts of an invoice', () => {
  const lines = [{ netMinor: 1263_80 }, { netMinor: -180_00 }]
  const VAT = { vatBasisPoints: 2500, reverseCharge: false }

  it('add up', () => {
    // 1263.80 − 180 = 1083.80; 25 % = 270.95; together 1354.75; less the deposit 583.13 = 771.62.
    expect(invoiceAmounts(lines, VAT, 583_13)).toEqual({ netMinor: 1083_80, vatMinor: 270_95, totalMinor: 1354_75, prepaidMinor: 583_13, dueMinor: 771_62 })
  })

  it('are refunded where more was paid before', () => {
    expect(invoiceAmounts(lines, VAT, 2000_00).dueMinor).toBe(-645_25) // 1354.75 − 2000
  })

  it('have no VAT under reverse charge', () => {
    expect(invoiceAmounts(lines, { ...VAT, reverseCharge: true }, 0)).toEqual({ netMinor: 1083_80, vatMinor: 0, totalMinor: 1083_80, prepaidMinor: 0, dueMinor: 1083_80 })
  })

  it('round VAT once, on the sum and not by line', () => {
    // Three lines of 0.02: 25 % of 0.06 is 0.015 → 0.02; by line it would be 3 × 0.01 = 0.03.
    expect(invoiceAmounts([{ netMinor: 2 }, { netMinor: 2 }, { netMinor: 2 }], VAT, 0).vatMinor).toBe(2)
  })
})
