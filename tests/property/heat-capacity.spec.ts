import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { fitLowTemperature, withMassUncertainty } from '#shared/heat-capacity/fit'
import { predictionBand } from '#shared/heat-capacity/prediction'
import { coverageFactor } from '#shared/heat-capacity/student'
import type { FitTerm, HeatCapacityCurve } from '#shared/heat-capacity/types'
import { seededRandom } from '../support/random'

const options = { atomsPerFormulaUnit: 1 }
const window = [0.1, 50] as const

/** Plausible curves: γ 0.1 to 50, β₃ 0.005 to 5, 8 to 60 points, noise of 0.1 to 3 %, σ stated or not. */
const curves = fc.record({
  gamma: fc.double({ min: 0.1, max: 50, noNaN: true }),
  beta3: fc.double({ min: 0.005, max: 5, noNaN: true }),
  tail: fc.constantFrom(0, 3),
  count: fc.integer({ min: 8, max: 60 }),
  share: fc.double({ min: 0.001, max: 0.03, noNaN: true }),
  seed: fc.integer(),
  stated: fc.boolean(),
}).map(({ gamma, beta3, tail, count, share, seed, stated }): HeatCapacityCurve => {
  const random = seededRandom(seed)
  const temperatureK = Array.from({ length: count }, (_, i) => 0.8 + 7 * i / count)
  const truth = temperatureK.map(t => gamma * t + beta3 * t ** 3 + tail / t ** 2)
  return {
    temperatureK,
    heatCapacity: truth.map(value => value * (1 + share * random.normal())),
    sigma: stated ? truth.map(value => value * share) : undefined,
  }
})
const termSets = fc.constantFrom<FitTerm[]>(['gamma', 'beta3'], ['gamma', 'beta3', 'tail'], ['gamma', 'beta3', 'beta5'], ['tail', 'gamma', 'beta3', 'beta5'])

/** Differences in units of the standard error: what matters of a fit. */
function close(a: number, b: number, standardError: number): boolean {
  return Math.abs(a - b) <= 1e-9 * (Math.abs(b) + standardError)
}

describe('a low-temperature fit', () => {
  it('does not care in which order the rows stand', () => {
    fc.assert(fc.property(curves, termSets, fc.integer(), (curve, terms, seed) => {
      const random = seededRandom(seed)
      const order = curve.temperatureK.map((_, i) => [random.next(), i] as const).sort((a, b) => a[0] - b[0]).map(([, i]) => i)
      const shuffled = { temperatureK: order.map(i => curve.temperatureK[i]!), heatCapacity: order.map(i => curve.heatCapacity[i]!), sigma: curve.sigma && order.map(i => curve.sigma![i]!) }
      const [a, b] = [fitLowTemperature(curve, { terms, windowK: window }, options), fitLowTemperature(shuffled, { terms, windowK: window }, options)]
      for (const term of terms) {
        expect(close(b.coefficients[term]!.value, a.coefficients[term]!.value, a.coefficients[term]!.standardError), term).toBe(true)
        expect(close(b.coefficients[term]!.standardError, a.coefficients[term]!.standardError, 0)).toBe(true)
      }
      expect(close(b.chiSquared, a.chiSquared, 0)).toBe(true)
    }), { seed: 20, numRuns: 300 })
  })

  it('does not care in which order the terms stand', () => {
    fc.assert(fc.property(curves, termSets, (curve, terms) => {
      const [a, b] = [terms, [...terms].reverse()].map(each => fitLowTemperature(curve, { terms: each, windowK: window }, options)) as [ReturnType<typeof fitLowTemperature>, ReturnType<typeof fitLowTemperature>]
      for (const term of terms) expect(close(b.coefficients[term]!.value, a.coefficients[term]!.value, a.coefficients[term]!.standardError)).toBe(true)
      const last = terms.length - 1
      expect(close(b.covariance[last]![0]!, a.covariance[0]![last]!, 0)).toBe(true)
    }), { seed: 21, numRuns: 300 })
  })

  it('scales γ and its error with the mass, and Θ_D with its cube root', () => {
    fc.assert(fc.property(curves, termSets, fc.double({ min: 0.01, max: 100, noNaN: true }), (curve, terms, factor) => {
      const scaled = { ...curve, heatCapacity: curve.heatCapacity.map(value => value * factor), sigma: curve.sigma?.map(value => value * factor) }
      const [a, b] = [fitLowTemperature(curve, { terms, windowK: window }, options), fitLowTemperature(scaled, { terms, windowK: window }, options)]
      for (const term of terms) {
        const [before, after] = [a.coefficients[term]!, b.coefficients[term]!]
        expect(close(after.value, factor * before.value, factor * before.standardError)).toBe(true)
        expect(close(after.standardError, factor * before.standardError, 0)).toBe(true)
      }
      expect(close(b.chiSquared, a.chiSquared, 0)).toBe(true)
      expect(b.debyeTemperature === undefined).toBe(a.debyeTemperature === undefined)
      if (a.debyeTemperature) expect(b.debyeTemperature!.value * Math.cbrt(factor) / a.debyeTemperature.value).toBeCloseTo(1, 6)
    }), { seed: 22, numRuns: 300 })
  })

  it('never has a smaller error for knowing the mass less well', () => {
    fc.assert(fc.property(curves, termSets, fc.double({ min: 0, max: 0.2, noNaN: true }), (curve, terms, relative) => {
      const fit = fitLowTemperature(curve, { terms, windowK: window }, options)
      const carried = withMassUncertainty(fit, relative)
      for (const term of terms) expect(carried.coefficients[term]!.standardError).toBeGreaterThanOrEqual(fit.coefficients[term]!.standardError * (1 - 1e-12))
    }), { seed: 23, numRuns: 200 })
  })
})

describe('noise of known size is covered by the stated errors, over 2 000 simulations', () => {
  const SIMULATIONS = 2000
  /** (12π⁴R/(5 · 0.05 mJ))^(1/3), by hand. */
  const TRUE_THETA_K = 338.75962
  const temperatureK = Array.from({ length: 30 }, (_, i) => 1.5 + 0.2 * i)
  const truth = temperatureK.map(t => 0.7 * t + 0.05 * t ** 3)
  const sigma = truth.map(value => 0.01 * value)
  const terms: FitTerm[] = ['gamma', 'beta3']
  /** Share of simulations, in per cent, in which `off` is at most `factor`. */
  const within = (off: number[], factor: number) => 100 * off.filter(each => each <= factor).length / off.length

  function simulate(count: number, stated: boolean): { gamma: number[], theta: number[], curve: number[] } {
    const random = seededRandom(1905)
    const off = { gamma: [] as number[], theta: [] as number[], curve: [] as number[] }
    const [temperatures, values, errors] = [temperatureK, truth, sigma].map(each => each.slice(0, count)) as [number[], number[], number[]]
    for (let run = 0; run < SIMULATIONS; run += 1) {
      const heatCapacity = values.map((value, i) => value + errors[i]! * random.normal())
      // Without knowing how large the errors are: the same σ ten times too small, scaled by √(χ²/ν).
      const curve = { temperatureK: temperatures, heatCapacity, sigma: errors.map(each => stated ? each : each / 10) }
      const fit = fitLowTemperature(curve, { terms, windowK: window }, { ...options, errorConvention: stated ? 'absolute' : 'scaled' })
      off.gamma.push(Math.abs(fit.coefficients.gamma!.value - 0.7) / fit.coefficients.gamma!.standardError)
      off.theta.push(Math.abs(fit.debyeTemperature!.value - TRUE_THETA_K) / fit.debyeTemperature!.standardError)
      const band = predictionBand(fit, [4])
      off.curve.push(Math.abs(band.heatCapacity[0]! - (0.7 * 4 + 0.05 * 64)) / band.standardError[0]!)
    }
    return off
  }

  it('with stated σ: 68 % within one error, 95 % within 1.96, for γ, Θ_D and the curve', () => {
    const off = simulate(30, true)
    for (const each of [off.gamma, off.theta, off.curve]) {
      expect(each).toHaveLength(SIMULATIONS)
      expect(Math.abs(within(each, 1) - 68.27)).toBeLessThan(2)
      expect(Math.abs(within(each, coverageFactor(0.95, Infinity)) - 95)).toBeLessThan(2)
    }
  })
  it('with scaled errors of few points: by Student’s factor, where 1.96 would cover too little', () => {
    const off = simulate(6, false)
    expect(Math.abs(within(off.gamma, coverageFactor(0.6827, 4)) - 68.27)).toBeLessThan(2)
    expect(Math.abs(within(off.gamma, coverageFactor(0.95, 4)) - 95)).toBeLessThan(2)
    expect(within(off.gamma, 1.96)).toBeLessThan(91)
  })
})
