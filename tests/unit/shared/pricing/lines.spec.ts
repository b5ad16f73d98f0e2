import { describe, expect, it } from 'vitest'
import { chargedQuantity, netOf, priceLines } from '#shared/pricing/lines'
import { PRICES, quantities } from './builders'

describe('a quantity as charged', () => {
  it.each([
    ['heliumLitres', 93.44, 93.4], ['heliumLitres', 93.45, 93.5],
    // The double nearest to 1.45 is just under it; by hand it rounds to 1.5. The same for 1.005 days.
    ['heliumLitres', 1.45, 1.5], ['cryostatDays', 1.005, 1.01], ['cryostatDays', 2.5, 2.5], ['operatorHours', 0.125, 0.13],
    ['cooldowns', 1, 1], ['mountings', 2, 2], ['recoveredLitres', 0.04, 0], ['recoveredLitres', 0.05, 0.1],
  ] as const)('%s of %d is %d', (key, value, charged) => {
    expect(chargedQuantity(key, value)).toBe(charged)
  })
})

describe('lines of a run', () => {
  it('are each a quantity at a price', () => {
    const lines = priceLines(quantities({ cooldowns: 1, cryostatDays: 3, heliumLitres: 50, recoveredLitres: 40, operatorHours: 4, mountings: 2 }), PRICES)
    expect(lines.map(line => [line.kind, line.label, line.quantity, line.unit, line.unitPriceMinor, line.netMinor])).toEqual([
      ['cooldown', 'Cooldown', 1, 'cooldown', 320_00, 320_00],
      ['cryostat-day', 'Time at the cryostat', 3, 'd', 160_00, 480_00], // 3 × 160
      ['helium-litre', 'Liquid helium used', 50, 'L', 11_50, 575_00], // 50 × 11.50
      ['recovery-litre', 'Helium returned to recovery', 40, 'L eq', -4_50, -180_00], // 40 × 4.50, a credit
      ['operator-hour', 'Operator', 4, 'h', 65_00, 260_00], // 4 × 65
      ['mounting', 'Sample mounting', 2, 'sample', 50_00, 100_00], // 2 × 50
    ])
    expect(netOf(lines)).toBe(1555_00) // 320 + 480 + 575 − 180 + 260 + 100
  })

  it('round once, on the charged quantity', () => {
    // 7.77 L is charged as 7.8 L: 7.8 × 11.55 = 90.09. 7.77 × 11.55 would be 89.74.
    const [line] = priceLines(quantities({ heliumLitres: 7.77 }), { ...PRICES, perLitreMinor: 11_55, minimumMinor: 0 })
    expect(line).toMatchObject({ quantity: 7.8, netMinor: 90_09 })
    // 0.1 L at 0.05 is half a cent: away from zero, as a charge and as a credit.
    const halves = priceLines(quantities({ heliumLitres: 0.1, recoveredLitres: 0.1 }), { ...PRICES, perLitreMinor: 5, recoveryCreditPerLitreMinor: 5, minimumMinor: 0 })
    expect(halves.map(({ netMinor }) => netMinor)).toEqual([1, -1])
  })

  it('leave out what is not used and what costs nothing', () => {
    const lines = priceLines(quantities({ cooldowns: 1, cryostatDays: 2, heliumLitres: 0.04, operatorHours: 3 }), { ...PRICES, perOperatorHourMinor: 0 })
    expect(lines.map(({ kind }) => kind)).toEqual(['cooldown', 'cryostat-day'])
    const closedCycle = priceLines(quantities({ cooldowns: 1, recoveredLitres: 10 }), { ...PRICES, recoveryCreditPerLitreMinor: 0 })
    expect(closedCycle.map(({ kind }) => kind)).toEqual(['cooldown'])
  })

  it('are made up to the minimum charge', () => {
    // 1 × 160 = 160; 250 − 160 = 90 are missing.
    const lines = priceLines(quantities({ cryostatDays: 1 }), PRICES)
    expect(lines.at(-1)).toEqual({ kind: 'minimum', label: 'Made up to the minimum charge', unit: 'run', quantity: 1, unitPriceMinor: 90_00, netMinor: 90_00 })
    expect(netOf(lines)).toBe(250_00)
  })

  it('need no making up at the minimum exactly, and are made up from a cent below', () => {
    const at = (minimumMinor: number) => priceLines(quantities({ cryostatDays: 1 }), { ...PRICES, minimumMinor }).map(({ kind, netMinor }) => [kind, netMinor])
    expect(at(160_00)).toEqual([['cryostat-day', 160_00]])
    expect(at(160_01)).toEqual([['cryostat-day', 160_00], ['minimum', 1]])
  })

  it('never pay the group for a run, whatever was recovered', () => {
    // A credit of 100 × 4.50 = 450 against one day of 160: made up from −290 to nothing.
    const lines = priceLines(quantities({ cryostatDays: 1, recoveredLitres: 100 }), { ...PRICES, minimumMinor: 0 })
    expect(netOf(lines)).toBe(0)
    expect(lines.at(-1)?.netMinor).toBe(290_00)
  })

  it('refuse a quantity that is no number', () => {
    expect(() => priceLines(quantities({ heliumLitres: Number.NaN }), PRICES)).toThrow('This amount is too large to be charged. Check the quantity.')
  })
})
