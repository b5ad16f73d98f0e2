import { describe, expect, it } from 'vitest'
import type { DomainError } from '#shared/errors'
import { correctedAkaike } from '#shared/heat-capacity/akaike'
import { fitLowTemperature, withMassUncertainty } from '#shared/heat-capacity/fit'
import { solveLeastSquares } from '#shared/heat-capacity/least-squares'
import { fittedEntropy, predictionBand } from '#shared/heat-capacity/prediction'
import { coverageFactor, studentCoverage } from '#shared/heat-capacity/student'
import type { FitModel, FitTerm, HeatCapacityCurve } from '#shared/heat-capacity/types'

const temperatureK = [1.5, 2, 2.5, 3, 3.5, 4, 4.5, 5, 5.5, 6]
const wiggle = [1, -1, 0.5, -0.5, 1, -1, -0.5, 0.5, 1, -1]
/** γ = 0.7, β₃ = 0.05 with a known pattern of departures of about 0.1 %. */
const curve: HeatCapacityCurve = { temperatureK, heatCapacity: temperatureK.map((t, i) => (0.7 * t + 0.05 * t ** 3) * (1 + 1e-3 * wiggle[i]!)) }
const model = (terms: FitTerm[] = ['gamma', 'beta3'], windowK: readonly [number, number] = [1, 7]): FitModel => ({ terms, windowK })
const options = { atomsPerFormulaUnit: 1 }

function refusal(act: () => unknown): { message: string, path: (string | number)[] } {
  try {
    act()
  }
  catch (error) {
    return { message: (error as DomainError).message, path: (error as DomainError).path }
  }
  throw new Error('it was not refused')
}

describe('what a fit refuses, and how it says so', () => {
  it.each<[string, HeatCapacityCurve, FitModel, string, string]>([
    ['no points', curve, model(undefined, [20, 30]), 'No points lie between 20 K and 30 K', 'windowK'],
    ['one point', curve, model(undefined, [1.4, 1.6]), 'Only one point lies', 'windowK'],
    ['as many points as coefficients', curve, model(undefined, [1.4, 2.1]), 'standard errors are undefined', 'windowK'],
    ['all at one temperature', { temperatureK: [2, 2, 2, 2], heatCapacity: [1, 1.1, 1, 1.2] }, model(), 'only one temperature', 'windowK'],
    ['two temperatures for three terms', { temperatureK: [2, 2, 3, 3], heatCapacity: [1, 1.1, 2, 2.2] }, model(['gamma', 'beta3', 'tail']), 'only 2 temperatures', 'windowK'],
    ['a window turned round', curve, model(undefined, [5, 2]), 'from a lower to a higher', 'windowK'],
    ['a window below zero', curve, model(undefined, [-1, 2]), 'from a lower to a higher', 'windowK'],
    ['no terms', curve, model([]), 'no terms', 'terms'],
    ['a term twice', curve, model(['gamma', 'gamma']), 'stands twice', 'terms'],
    ['unlike lengths', { temperatureK, heatCapacity: [1, 2] }, model(), 'equally many', 'curve'],
    ['a heat capacity of zero with relative weights', { temperatureK, heatCapacity: temperatureK.map((t, i) => i === 3 ? 0 : t) }, model(), 'Point 4 (3 K) has a heat capacity that is not above zero', 'curve'],
    ['NaN', { temperatureK, heatCapacity: temperatureK.map((t, i) => i === 2 ? Number.NaN : t) }, model(), 'Point 3 (2.5 K) is no measurement', 'curve'],
    ['a stated σ of zero', { ...curve, sigma: temperatureK.map((_, i) => i === 1 ? 0 : 0.1) }, model(), 'Point 2 (2 K) states an uncertainty', 'curve'],
    ['a temperature of zero', { temperatureK: [0, 1, 2, 3], heatCapacity: [1, 2, 3, 4] }, model(undefined, [0, 4]), 'Point 1 (0 K) is no measurement', 'curve'],
  ])('%s', (_, data, asked, words, place) => {
    const { message, path } = refusal(() => fitLowTemperature(data, asked, options))
    expect(message).toContain(words)
    expect(path[0]).toBe(place)
  })
  it('refuses stated weights where none are stated', () => {
    expect(refusal(() => fitLowTemperature(curve, model(), { ...options, weights: 'stated-sigma' })).path).toEqual(['weights'])
  })
})

describe('a fit', () => {
  it('has no Θ_D when β₃ is not above zero, and never NaN', () => {
    const falling = { temperatureK, heatCapacity: temperatureK.map(t => 3 * t - 0.01 * t ** 3) }
    const fit = fitLowTemperature(falling, model(), options)
    expect(fit.coefficients.beta3!.value).toBeLessThan(0)
    expect(fit.debyeTemperature).toBeUndefined()
  })
  it('has no Θ_D without a lattice term', () => {
    expect(fitLowTemperature(curve, model(['gamma']), options).debyeTemperature).toBeUndefined()
  })
  it('uses only the points of its window, both ends included', () => {
    const fit = fitLowTemperature(curve, model(undefined, [2, 5]), options)
    expect(fit.usedIndices).toEqual([1, 2, 3, 4, 5, 6, 7])
    expect(fit).toMatchObject({ pointCount: 7, degreesOfFreedom: 5 })
    expect(fit.residuals).toHaveLength(7)
  })
  it('gives units by term', () => {
    const fit = fitLowTemperature(curve, model(['gamma', 'beta3', 'beta5', 'tail', 'constant']), options)
    expect(Object.fromEntries(Object.entries(fit.coefficients).map(([term, estimate]) => [term, estimate.unit]))).toEqual({
      gamma: 'mJ/(mol K²)', beta3: 'mJ/(mol K⁴)', beta5: 'mJ/(mol K⁶)', tail: 'mJ K/mol', constant: 'mJ/(mol K)',
    })
  })
  it('takes stated σ at face value: half the σ, half the errors, four times χ²', () => {
    const sigma = temperatureK.map(() => 0.02)
    const wide = fitLowTemperature({ ...curve, sigma }, model(), options)
    const narrow = fitLowTemperature({ ...curve, sigma: sigma.map(s => s / 2) }, model(), options)
    expect(narrow.coefficients.gamma!.standardError).toBeCloseTo(wide.coefficients.gamma!.standardError / 2, 14)
    expect(narrow.chiSquared).toBeCloseTo(4 * wide.chiSquared, 10)
    expect(narrow.coefficients.gamma!.value).toBeCloseTo(wide.coefficients.gamma!.value, 14)
  })
  it('has scaled errors that do not depend on the relative σ that was assumed', () => {
    const one = fitLowTemperature(curve, model(), options)
    const ten = fitLowTemperature(curve, model(), { ...options, relativeSigma: 0.1 })
    expect(ten.coefficients.gamma!.standardError / one.coefficients.gamma!.standardError).toBeCloseTo(1, 12)
    expect(ten.chiSquared).toBeCloseTo(one.chiSquared / 100, 12)
  })
  it('knows the two conventions to differ by √(χ²/ν)', () => {
    const sigma = temperatureK.map(() => 0.01)
    const absolute = fitLowTemperature({ ...curve, sigma }, model(), options)
    const scaled = fitLowTemperature({ ...curve, sigma }, model(), { ...options, errorConvention: 'scaled' })
    expect(scaled.coefficients.beta3!.standardError / absolute.coefficients.beta3!.standardError).toBeCloseTo(Math.sqrt(absolute.reducedChiSquared), 12)
  })
})

describe('the uncertainty of the mass', () => {
  const fit = fitLowTemperature(curve, model(), options)
  const carried = withMassUncertainty(fit, 0.02)
  it('adds in quadrature to γ and β₃, and a third of it to Θ_D', () => {
    const { gamma, beta3 } = fit.coefficients
    expect(carried.coefficients.gamma!.standardError).toBeCloseTo(Math.hypot(gamma!.standardError, 0.02 * gamma!.value), 14)
    expect(carried.coefficients.beta3!.standardError).toBeCloseTo(Math.hypot(beta3!.standardError, 0.02 * beta3!.value), 14)
    expect(carried.debyeTemperature!.standardError).toBeCloseTo(Math.hypot(fit.debyeTemperature!.standardError, fit.debyeTemperature!.value * 0.02 / 3), 12)
    expect(carried.covariance[0]![1]).toBeCloseTo(fit.covariance[0]![1]! + 0.0004 * gamma!.value * beta3!.value, 14)
  })
  it('is no noise: χ² and residuals stay', () => {
    expect(carried.chiSquared).toBe(fit.chiSquared)
    expect(carried.residuals).toBe(fit.residuals)
  })
  it('is not added twice, and not when it is none', () => {
    expect(() => withMassUncertainty(carried, 0.02)).toThrow('in these errors already')
    expect(() => withMassUncertainty(fit, -1)).toThrow('zero or more')
  })
})

describe('prediction band', () => {
  it('is the fit, with the standard error of γT where only γT is fitted', () => {
    const fit = fitLowTemperature(curve, model(['gamma']), options)
    const band = predictionBand(fit, [2, 4])
    expect(band.heatCapacity[0]).toBeCloseTo(2 * fit.coefficients.gamma!.value, 14)
    expect(band.standardError[1]).toBeCloseTo(4 * fit.coefficients.gamma!.standardError, 14)
    expect(band.curveHalfWidth[1]).toBeCloseTo(4 * fit.coefficients.gamma!.standardError * coverageFactor(0.95, 9), 12)
    // One more point: 1 % of C, scaled by √(χ²/ν), in quadrature.
    expect(band.pointHalfWidth![1]).toBeCloseTo(coverageFactor(0.95, 9) * Math.hypot(band.standardError[1]!, Math.sqrt(fit.reducedChiSquared) * 0.01 * band.heatCapacity[1]!), 12)
  })
  it('uses the covariance: at the middle of the data the curve is known better than its terms', () => {
    const fit = fitLowTemperature(curve, model(), options)
    const [standardError] = predictionBand(fit, [4]).standardError
    expect(standardError!).toBeLessThan(Math.hypot(4 * fit.coefficients.gamma!.standardError, 64 * fit.coefficients.beta3!.standardError))
  })
  it('has no band for a new point where stated σ do not tell its error', () => {
    const fit = fitLowTemperature({ ...curve, sigma: temperatureK.map(() => 0.02) }, model(), options)
    expect(predictionBand(fit, [3]).pointHalfWidth).toBeUndefined()
    expect(predictionBand(fit, [3], { sigmaAt: () => 0.02 }).pointHalfWidth![0]).toBeGreaterThan(1.959 * 0.02)
  })
})

describe('entropy at the end of the window', () => {
  it('is γT + β₃T³/3 as in the worked conversions', () => {
    // j_conversions.csv: γ 0.695 at 10 K gives 6.95; β₃ 0.047548 at 10 K gives 15.8493 mJ/(mol K).
    const exact = { temperatureK, heatCapacity: temperatureK.map(t => 0.695 * t + 0.047548 * t ** 3) }
    const fit = fitLowTemperature(exact, model(undefined, [1, 10]), options)
    expect(fittedEntropy(fit)).toMatchObject({ unit: 'mJ/(mol K)', leftOut: [] })
    expect(fittedEntropy(fit).value).toBeCloseTo(6.95 + 15.8493, 3)
  })
  it('leaves the tail out and says so', () => {
    const entropy = fittedEntropy(fitLowTemperature(curve, model(['gamma', 'beta3', 'tail']), options), 5)
    expect(entropy.leftOut).toEqual(['tail'])
    expect(entropy.note).toContain('A/T²')
  })
})

describe('Student and Akaike', () => {
  it.each([
    // scipy.stats.t.ppf((1 + coverage)/2, ν), scipy 1.10.1
    [0.95, 1, 12.706204736432095], [0.95, 10, 2.2281388519649385], [0.6827, 5, 1.1105333938049362], [0.99, 46, 2.687013492242218],
  ])('covers %d with ν = %d at %d standard errors', (coverage, freedom, factor) => {
    expect(coverageFactor(coverage, freedom) / factor).toBeCloseTo(1, 10)
    expect(studentCoverage(factor, freedom)).toBeCloseTo(coverage, 10)
  })
  it('becomes normal for known errors', () => {
    expect(coverageFactor(0.95, Infinity)).toBeCloseTo(1.959963984540054, 5)
    expect(() => coverageFactor(1, 5)).toThrow('between 0 and 100')
    expect(() => coverageFactor(0.95, 0)).toThrow('no interval')
  })
  it('corrects Akaike for few points', () => {
    // By hand: N = 10, p = 2, known errors: 8 + 4 + 12/7; unknown: 10 ln 0.8 + 6 + 24/6.
    expect(correctedAkaike(8, 10, 2, 'absolute')).toBeCloseTo(8 + 4 + 12 / 7, 12)
    expect(correctedAkaike(8, 10, 2, 'scaled')).toBeCloseTo(10 * Math.log(0.8) + 6 + 4, 12)
    expect(correctedAkaike(8, 4, 2, 'scaled')).toBeUndefined()
    expect(correctedAkaike(0, 10, 2, 'scaled')).toBeUndefined()
  })
})

describe('least squares', () => {
  it('knows no errors when there are as many coefficients as points', () => {
    const solution = solveLeastSquares({ columns: [[1, 1], [0, 1]], values: [3, 5] })
    expect(solution.degreesOfFreedom).toBe(0)
    expect(solution.coefficients[0]).toBeCloseTo(3, 14)
    expect(solution.coefficients[1]).toBeCloseTo(2, 14)
    expect(solution.scaledStandardErrors).toBeUndefined()
  })
  it('refuses columns that say the same, or nothing', () => {
    expect(() => solveLeastSquares({ columns: [[1, 2, 3], [2, 4, 6]], values: [1, 2, 3] })).toThrow('cannot tell the terms')
    expect(() => solveLeastSquares({ columns: [[0, 0, 0]], values: [1, 2, 3] })).toThrow('cannot tell the terms')
  })
  it('does not mind columns of very unlike size', () => {
    const x = [1, 2, 3, 4, 5]
    const solution = solveLeastSquares({ columns: [x.map(() => 1e-150), x.map(each => each * 1e150)], values: x.map(each => 2 + 3 * each) })
    expect(solution.coefficients[0]! * 1e-150).toBeCloseTo(2, 12)
    expect(solution.coefficients[1]! * 1e150).toBeCloseTo(3, 12)
    expect(solution.conditionNumber).toBeLessThan(10)
  })
  it('refuses what it cannot use', () => {
    expect(() => solveLeastSquares({ columns: [], values: [1] })).toThrow('no terms')
    expect(() => solveLeastSquares({ columns: [[1], [2]], values: [1] })).toThrow('cannot settle 2')
    expect(() => solveLeastSquares({ columns: [[1, 2]], values: [1, Infinity] })).toThrow('Point 2')
    expect(() => solveLeastSquares({ columns: [[1, 2]], values: [1, 2], sigma: [1, -1] })).toThrow('uncertainty')
    expect(() => solveLeastSquares({ columns: [[1, 2]], values: [1, 2], sigma: [1] })).toThrow('equally many')
  })
})
