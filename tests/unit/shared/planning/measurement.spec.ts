import { describe, expect, it } from 'vitest'
import { cooldownLitres } from '#shared/planning/cooldown'
import { expectedHeatCapacity, measurementTime, relaxationTimeS, spreadTemperaturesK } from '#shared/planning/measurement'
import type { CalorimeterFacts } from '#shared/planning/types'
import { COPPER } from './builders'

const CALORIMETER: CalorimeterFacts = {
  conductanceAt1KWPerK: 1e-6, conductanceExponent: 1, addendaAt1KJPerK: 1e-8, addendaExponent: 3, relaxationTimesPerPoint: 10, settleS: 100,
}

describe('hours of a measurement', () => {
  it('spreads temperatures evenly on a logarithmic scale', () => {
    const temperatures = spreadTemperaturesK(1, 100, 3)
    expect(temperatures).toHaveLength(3)
    expect(temperatures[1]).toBeCloseTo(10, 12)
    expect(temperatures[2]).toBe(100)
    expect(spreadTemperaturesK(2, 20, 1)).toEqual([2])
  })

  it('takes τ = C/K with the sample and the addenda', () => {
    const sample = { amountMol: 1e-3, heatCapacityJPerMolK: (t: number) => 2e-3 * t }
    // At 2 K: sample 1e-3 × 4e-3 = 4e-6, addenda 1e-8 × 8 = 8e-8, link 2e-6: τ = 4.08e-6/2e-6 = 2.04 s.
    expect(relaxationTimeS(CALORIMETER, sample, 2)).toBeCloseTo(2.04, 12)
  })

  it('adds settling and relaxation over the points and names the slowest', () => {
    const sample = { label: 'X', amountMol: 1e-3, heatCapacityJPerMolK: () => 0.01 }
    const time = measurementTime({ ...CALORIMETER, addendaAt1KJPerK: 0 }, sample, [1, 2])
    // τ: 1e-5/1e-6 = 10 s and 1e-5/2e-6 = 5 s; points 100 + 100 and 100 + 50 s: 350 s.
    expect(time.totalHours).toBeCloseTo(350 / 3600, 12)
    expect(time.slowest.temperatureK).toBe(1)
  })

  it('expects of copper at 4 K what its γ and Θ_D say', () => {
    // γT + (12π⁴/5)R(T/Θ)³ = 2.78 + 1943.77 × (4/343)³ × 1000 = 2.78 + 3.083 mJ/(mol K).
    expect(COPPER.heatCapacityJPerMolK(4) * 1000).toBeCloseTo(2.78 + 3.083, 2)
    const oxide = expectedHeatCapacity({ gammaJPerMolK2: 0, debyeTemperatureK: 343, atomsPerFormulaUnit: 5 })
    expect(oxide(4) * 1000).toBeCloseTo(5 * 3.083, 1)
    expect(oxide(0)).toBe(0)
  })

  it('refuses ranges, points and samples that cannot be', () => {
    expect(() => spreadTemperaturesK(0, 4, 10)).toThrow(/above 0 K/)
    expect(() => spreadTemperaturesK(5, 4, 10)).toThrow(/higher highest/)
    expect(() => spreadTemperaturesK(1, 4, 0)).toThrow(/whole number/)
    expect(() => spreadTemperaturesK(1, 4, 10_001)).toThrow(/whole number/)
    expect(() => measurementTime(CALORIMETER, COPPER, [])).toThrow(/at least one point/)
    expect(() => measurementTime(CALORIMETER, { ...COPPER, amountMol: 0 }, [4])).toThrow(/amount of sample/)
    expect(() => measurementTime(CALORIMETER, { ...COPPER, heatCapacityJPerMolK: () => Number.NaN }, [4])).toThrow(/relaxation time/)
  })
})

describe('cooldown litres', () => {
  it('falls with the share of the gas used and adds over parts', () => {
    const [copper, steel] = [{ material: 'copper' as const, massKg: 10 }, { material: 'stainless-steel' as const, massKg: 5 }]
    expect(cooldownLitres([copper], 300, 0.2)).toBeLessThan(cooldownLitres([copper], 300, 0.1))
    expect(cooldownLitres([copper, steel], 77, 0.3)).toBeCloseTo(cooldownLitres([copper], 77, 0.3) + cooldownLitres([steel], 77, 0.3), 10)
    expect(cooldownLitres([], 300, 0.5)).toBe(0)
    expect(cooldownLitres([copper], 4.2, 0.5)).toBe(0)
  })

  it('refuses shares, masses and temperatures that cannot be', () => {
    expect(() => cooldownLitres([], 300, 1.1)).toThrow(/0 to 1/)
    expect(() => cooldownLitres([{ material: 'copper', massKg: -1 }], 300, 0.5)).toThrow(/part 1/)
    expect(() => cooldownLitres([{ material: 'copper', massKg: 1 }], 310, 0.5)).toThrow(/300 K/)
  })
})
