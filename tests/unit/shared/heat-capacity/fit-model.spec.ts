import { describe, expect, it } from 'vitest'
import { debyeHeatCapacity, einsteinHeatCapacity, schottkyHeatCapacity } from '#shared/heat-capacity/debye'
import { fitCurveModel, modelHeatCapacity } from '#shared/heat-capacity/fit-model'
import { fitNonlinear } from '#shared/heat-capacity/nonlinear'
import { GAS_CONSTANT_J_PER_MOL_K } from '#shared/materials/constants'
import { seededRandom } from '../../../support/random'

const R_MJ = 1000 * GAS_CONSTANT_J_PER_MOL_K
const grid = (from: number, to: number, count: number) => Array.from({ length: count }, (_, i) => from + (to - from) * i / (count - 1))
const curveOf = (temperatureK: number[], model: (t: number) => number) => ({ temperatureK, heatCapacity: temperatureK.map(model) })
const one = { atomsPerFormulaUnit: 1 }

describe('models give back what they were made of', () => {
  it('a Schottky anomaly on electrons and lattice', () => {
    const curve = curveOf(grid(0.4, 12, 60), t => 0.02 * R_MJ * schottkyHeatCapacity(t / 3, 2) + 5 * t + 0.3 * t ** 3)
    const fit = fitCurveModel(curve, { id: 'schottky', windowK: [0.3, 13], background: ['gamma', 'beta3'], degeneracyRatio: 'fit' }, one)
    expect(fit.parameterNames).toEqual(['gap', 'degeneracyRatio', 'amount', 'gamma', 'beta3'])
    for (const [name, value] of Object.entries({ gap: 3, degeneracyRatio: 2, amount: 0.02, gamma: 5, beta3: 0.3 })) expect(fit.parameters[name]!.value / value, name).toBeCloseTo(1, 7)
    expect(fit.degreesOfFreedom).toBe(55)
    const held = fitCurveModel(curve, { id: 'schottky', windowK: [0.3, 13], background: ['gamma', 'beta3'], degeneracyRatio: 2 }, one)
    expect(held.parameters.gap!.value).toBeCloseTo(3, 6)
    expect(held.parameters.degeneracyRatio).toBeUndefined()
  })
  it('a gapped exponential', () => {
    const curve = curveOf(grid(0.8, 4, 40), t => 900 * Math.exp(-7 / t))
    const fit = fitCurveModel(curve, { id: 'gapped-exponential', windowK: [0.5, 5] }, one)
    expect(fit.parameters.gap!.value).toBeCloseTo(7, 7)
    expect(fit.parameters.prefactor).toMatchObject({ unit: 'mJ/(mol K)' })
    expect(fit.parameters.prefactor!.value / 900).toBeCloseTo(1, 7)
  })
  it('a Debye lattice of five atoms with electrons', () => {
    const curve = curveOf(grid(5, 300, 60), t => 15 * R_MJ * debyeHeatCapacity(t / 420) + 8 * t)
    const fit = fitCurveModel(curve, { id: 'debye', windowK: [1, 300], background: ['gamma'] }, { atomsPerFormulaUnit: 5 })
    expect(fit.parameters.debyeTemperature!.value).toBeCloseTo(420, 6)
    expect(fit.parameters.gamma!.value).toBeCloseTo(8, 6)
    expect(modelHeatCapacity(fit, [50])[0]! / (15 * R_MJ * debyeHeatCapacity(50 / 420) + 400)).toBeCloseTo(1, 9)
  })
  it('Debye and Einstein modes together', () => {
    const curve = curveOf(grid(3, 300, 80), t => 3 * R_MJ * (2 * debyeHeatCapacity(t / 250) + 3 * einsteinHeatCapacity(t / 600)))
    const fit = fitCurveModel(curve, { id: 'debye-einstein', windowK: [1, 300] }, { atomsPerFormulaUnit: 5 })
    for (const [name, value] of Object.entries({ debyeTemperature: 250, einsteinTemperature: 600, debyeAtoms: 2, einsteinAtoms: 3 })) expect(fit.parameters[name]!.value / value, name).toBeCloseTo(1, 6)
  })
})

describe('errors of a model', () => {
  it('cover the truth: the gap of 300 noisy anomalies lies within one error in about 68 % and two in about 95 %', () => {
    const random = seededRandom(41)
    const temperatureK = grid(0.5, 8, 40)
    const truth = temperatureK.map(t => 0.1 * R_MJ * schottkyHeatCapacity(t / 3) + 4 * t)
    const sigma = truth.map(value => 0.01 * value)
    let [one_, two] = [0, 0]
    for (let run = 0; run < 300; run += 1) {
      const heatCapacity = truth.map((value, i) => value + sigma[i]! * random.normal())
      const { gap } = fitCurveModel({ temperatureK, heatCapacity, sigma }, { id: 'schottky', windowK: [0.4, 9], background: ['gamma'] }, one).parameters
      const off = Math.abs(gap!.value - 3) / gap!.standardError
      if (off < 1) one_ += 1
      if (off < 2) two += 1
    }
    // 300 draws: one standard deviation of the count is 2.7 % and 1.3 %; three of them are allowed.
    expect(one_ / 300).toBeGreaterThan(0.683 - 0.081)
    expect(one_ / 300).toBeLessThan(0.683 + 0.081)
    expect(two / 300).toBeGreaterThan(0.954 - 0.036)
  })
})

describe('what a model refuses', () => {
  const curve = curveOf(grid(1, 5, 5), t => t)
  it.each<[string, () => unknown, string]>([
    ['too few points', () => fitCurveModel(curve, { id: 'debye-einstein', windowK: [0, 6], background: ['gamma'] }, one), 'need at least 6'],
    ['a term twice', () => fitCurveModel(curve, { id: 'debye', windowK: [0, 6], background: ['gamma', 'gamma'] }, one), 'stands twice'],
    ['no atoms', () => fitCurveModel(curve, { id: 'debye', windowK: [0, 6] }, { atomsPerFormulaUnit: 0 }), 'Atoms per formula unit'],
    ['a degeneracy of zero', () => fitCurveModel(curve, { id: 'schottky', windowK: [0, 6], degeneracyRatio: 0 }, one), 'degeneracy ratio must be above zero'],
    ['weights shorter than the data', () => fitNonlinear({ evaluate: ([a]) => [a!, a!, a!], values: [1, 2, 3], sigma: [1], start: [1] }), 'equally many'],
    ['a start that must be positive and is not', () => fitNonlinear({ evaluate: ([a]) => [a!, a!, a!], values: [1, 2, 3], start: [-1], positive: [true] }), 'above zero'],
    ['a model that is not finite', () => fitNonlinear({ evaluate: () => [Number.NaN, 1, 1], values: [1, 2, 3], start: [1] }), 'no value at its start'],
    ['as many parameters as points', () => fitNonlinear({ evaluate: ([a, b]) => [a!, b!], values: [1, 2], start: [1, 1] }), 'need'],
    ['a parameter without hold in the data', () => fitNonlinear({ evaluate: ([a, b]) => [a! + b!, a! + b!, a! + b!], values: [1, 2, 3], start: [1, 1] }), 'cannot tell'],
    ['a fit that does not settle', () => fitNonlinear({ evaluate: ([a]) => [Math.exp(a!), 0, 0], values: [0, 0, 0], start: [5], maximumSteps: 3 }), 'did not settle'],
  ])('%s', (_, act, words) => expect(act).toThrow(words))

  it('says when a window far above the gap knows only the tail', () => {
    const tail = curveOf(grid(20, 60, 30), t => 0.05 * R_MJ * schottkyHeatCapacity(t / 1e-3))
    // n and Δ enter as nΔ² only, so no pair of them is the best.
    expect(() => fitCurveModel(tail, { id: 'schottky', windowK: [10, 70] }, one)).toThrow('did not settle')
  })
})
