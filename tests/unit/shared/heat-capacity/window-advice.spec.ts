import { describe, expect, it } from 'vitest'
import { beta3FromDebyeTemperature, debyeHeatCapacity } from '#shared/heat-capacity/debye'
import { adviseWindow } from '#shared/heat-capacity/window-advice'
import { GAS_CONSTANT_J_PER_MOL_K } from '#shared/materials/constants'
import { copperReferenceHeatCapacity } from '#shared/materials/copper-reference'
import { seededRandom } from '../../../support/random'

const options = { atomsPerFormulaUnit: 1 }
const grid = (from: number, to: number, count: number) => Array.from({ length: count }, (_, i) => from + (to - from) * i / (count - 1))

/** A curve with Gaussian noise of a stated share. */
function noisy(temperatureK: number[], model: (t: number) => number, share: number, seed = 7) {
  const random = seededRandom(seed)
  const truth = temperatureK.map(model)
  return { temperatureK, heatCapacity: truth.map(value => value * (1 + share * random.normal())), sigma: truth.map(value => value * share) }
}

describe('window advice', () => {
  it('keeps copper under Θ_D/50 = 6.9 K and gives its γ', () => {
    const advice = adviseWindow(noisy(grid(1, 20, 120), copperReferenceHeatCapacity, 0.005), options)
    expect(advice.rule).toBe('kept')
    expect(advice.windowK[0]).toBe(1)
    expect(advice.windowK[1]).toBeLessThanOrEqual(345 / 50 + 0.1)
    expect(advice.windowK[1]).toBeGreaterThan(4)
    const chosen = advice.series.find(each => each.highK === advice.windowK[1])!
    expect(Math.abs(chosen.gamma - 0.69434)).toBeLessThan(3 * chosen.gammaStandardError)
    expect(advice.series.length).toBeLessThanOrEqual(40)
    expect(advice.series.at(-1)!.withinT3Range).toBe(false)
    expect(advice.reason).toMatch(/T³ law|drifts/)
  })
  it('stops where γ begins to drift, before Θ_D/50', () => {
    // A soft Einstein-like bump of 3 % at 4 K makes γ fall in wider windows although Θ_D/50 is 8 K.
    const beta3 = beta3FromDebyeTemperature(400, 1)
    const curve = noisy(grid(1, 8, 100), t => 1 * t + beta3 * t ** 3 + (t > 3.5 ? 0.05 * (t - 3.5) ** 2 : 0), 0.002)
    const advice = adviseWindow(curve, options)
    expect(advice.windowK[1]).toBeLessThan(6)
    expect(advice.windowK[1]).toBeGreaterThan(3)
    expect(advice.plateauK[1]).toBe(advice.windowK[1])
    expect(advice.reason).toContain('drifts')
  })
  it('adds β₅ when the lattice has one, and not when it has none', () => {
    const beta3 = beta3FromDebyeTemperature(400, 1)
    const plain = adviseWindow(noisy(grid(1, 7.5, 80), t => t + beta3 * t ** 3, 0.005), options)
    expect(plain.terms).toEqual(['gamma', 'beta3'])
    expect(plain.reason).toContain('brings nothing')
    expect(plain.windowK[1]).toBeGreaterThan(6.5)
    // β₅T⁵ of 8 % of the lattice at 7 K, too slowly bending to move γ out of its error at this noise.
    const bent = adviseWindow(noisy(grid(1, 7.5, 400), t => t + beta3 * t ** 3 * (1 + 0.0016 * t ** 2), 0.01, 3), options)
    expect(bent.terms).toContain('beta5')
    expect(bent.reason).toContain('is added')
  })
  it('says when no window keeps to the T³ law, as in lead or caesium above 2 K', () => {
    const advice = adviseWindow(noisy(grid(2, 10, 60), t => 3.2 * t + 3000 * GAS_CONSTANT_J_PER_MOL_K * debyeHeatCapacity(t / 38), 0.01), options)
    expect(advice.rule).toBe('no-window-in-T3-range')
    expect(advice.windowK[1]).toBe(advice.series[0]!.highK)
    expect(advice.reason).toContain('No window keeps to the T³ range')
  })
  it('says when there is no lattice term at all', () => {
    const temperatureK = grid(1, 6, 30)
    const advice = adviseWindow({ temperatureK, heatCapacity: temperatureK.map(t => 3 * t - 0.01 * t ** 3) }, options)
    expect(advice.reason).toContain('No window gives a lattice term above zero')
    expect(advice.series.every(each => each.debyeTemperatureK === undefined)).toBe(true)
  })
  it('refuses too few points and a model without γ', () => {
    expect(() => adviseWindow({ temperatureK: [1, 2, 3], heatCapacity: [1, 2, 3] }, options)).toThrow('Only 3 temperatures')
    expect(() => adviseWindow({ temperatureK: [], heatCapacity: [] }, options)).toThrow('Only 0 temperatures')
    expect(() => adviseWindow({ temperatureK: [1, 2, 3], heatCapacity: [1, 2, 3] }, { ...options, terms: ['beta3'] })).toThrow('must be in the model')
  })
})
