import { describe, expect, it } from 'vitest'
import { debyeTemperatureFromBeta3 } from '#shared/heat-capacity/debye'
import { fitLowTemperature } from '#shared/heat-capacity/fit'
import type { HeatCapacityCurve } from '#shared/heat-capacity/types'
import { COPPER_REFERENCE_COEFFICIENTS, copperReferenceHeatCapacity } from '#shared/materials/copper-reference'
import { referenceJson, referenceTable, relativeDifference } from '../support/reference-data'

// Data, fits computed independently (numpy, scipy) and licences: tests/reference/data/heat-capacity/SOURCE.md.
const provenance = referenceJson<{ analysis: Record<string, unknown> }[]>('heat-capacity/PROVENANCE.json')

/** The measured oxide, J/(mol K) made mJ/(mol K). */
function oxide(): HeatCapacityCurve {
  const rows = referenceTable('heat-capacity/A_oxide_with_schottky_upturn_MIT.csv')
  return { temperatureK: rows.map(row => Number(row.T_K)), heatCapacity: rows.map(row => 1000 * Number(row.C_J_per_mol_K)) }
}

describe('the measured oxide with an upturn', () => {
  const whole: readonly [number, number] = [1, 15]
  const tail = provenance[0]!.analysis['fit a T^-2 + gamma T + beta T^3, 1 % relative weights'] as { a: number, gamma: number, beta: number, se: number[], rel_rms: number }
  const naive = provenance[0]!.analysis['naive gamma T + beta T^3 (WRONG model)'] as { gamma: number, beta: number }

  it('has, with the A/T² tail, the independent coefficients and errors within 0.1 %', () => {
    const fit = fitLowTemperature(oxide(), { terms: ['tail', 'gamma', 'beta3'], windowK: whole }, { atomsPerFormulaUnit: 5 })
    expect(fit).toMatchObject({ weights: 'relative', errorConvention: 'scaled', pointCount: 49, degreesOfFreedom: 46, relativeSigma: 0.01 })
    const { tail: a, gamma, beta3 } = fit.coefficients
    for (const [estimate, value, error] of [[a!, tail.a, tail.se[0]!], [gamma!, tail.gamma, tail.se[1]!], [beta3!, tail.beta, tail.se[2]!]] as const) {
      expect(relativeDifference(estimate.value, 1000 * value)).toBeLessThan(1e-9)
      expect(relativeDifference(estimate.standardError, 1000 * error)).toBeLessThan(1e-9)
    }
    // γ is zero within its error: an insulator with a tail.
    expect(Math.abs(gamma!.value)).toBeLessThan(2 * gamma!.standardError)
    expect(relativeDifference(fit.debyeTemperature!.value, debyeTemperatureFromBeta3(1000 * tail.beta, 5)!.value)).toBeLessThan(1e-9)
    const rms = Math.sqrt(fit.residuals.reduce((sum, each) => sum + (each * 0.01) ** 2, 0) / 49)
    expect(relativeDifference(rms, tail.rel_rms)).toBeLessThan(1e-6)
  })

  it('has, without the tail, the wrong γ of 13.3 mJ/(mol K²) that the tail mends', () => {
    const fit = fitLowTemperature(oxide(), { terms: ['gamma', 'beta3'], windowK: whole }, { atomsPerFormulaUnit: 5 })
    expect(relativeDifference(fit.coefficients.gamma!.value, 1000 * naive.gamma)).toBeLessThan(1e-9)
    expect(relativeDifference(fit.coefficients.beta3!.value, 1000 * naive.beta)).toBeLessThan(1e-9)
    const mended = fitLowTemperature(oxide(), { terms: ['gamma', 'beta3', 'tail'], windowK: whole }, { atomsPerFormulaUnit: 5 })
    expect(mended.aicc!).toBeLessThan(fit.aicc! - 100)
  })
})

describe('published recommended values of OFHC copper', () => {
  it('has the independent fit from 4 to 10 K within 0.1 %', () => {
    const rows = referenceTable('heat-capacity/D_Cu_OFHC_NIST2013_table.csv')
    const curve = { temperatureK: rows.map(row => Number(row.T_K)), heatCapacity: rows.map(row => Number(row['c_J_per_kg_K']) * 63.546) }
    const independent = provenance[1]!.analysis['fit 4-10 K'] as { gamma: number, beta: number, Theta: number }
    const fit = fitLowTemperature(curve, { terms: ['gamma', 'beta3'], windowK: [4, 10] }, { atomsPerFormulaUnit: 1 })
    expect(relativeDifference(fit.coefficients.gamma!.value, independent.gamma)).toBeLessThan(1e-3)
    expect(relativeDifference(fit.coefficients.beta3!.value, independent.beta)).toBeLessThan(1e-3)
    expect(relativeDifference(fit.debyeTemperature!.value, independent.Theta)).toBeLessThan(1e-3)
  })
})

describe('the copper reference equation', () => {
  const temperatureK = Array.from({ length: 60 }, (_, index) => 1 + index * 0.1)
  const curve = { temperatureK, heatCapacity: temperatureK.map(copperReferenceHeatCapacity) }
  it('gives back its own γ and Θ_D, 344.5 K', () => {
    const fit = fitLowTemperature(curve, { terms: ['gamma', 'beta3', 'beta5'], windowK: [1, 7] }, { atomsPerFormulaUnit: 1 })
    expect(relativeDifference(fit.coefficients.gamma!.value, COPPER_REFERENCE_COEFFICIENTS[0]![1])).toBeLessThan(1e-3)
    expect(relativeDifference(fit.coefficients.beta3!.value, COPPER_REFERENCE_COEFFICIENTS[1]![1])).toBeLessThan(5e-3)
    expect(fit.debyeTemperature!.value).toBeCloseTo(344.5, 0)
  })
  it('gives back all six coefficients when it is fitted with what it is made of, up to T⁵', () => {
    const cut = temperatureK.map(t => 0.69434 * t + 4.7548e-2 * t ** 3 + 1.6314e-6 * t ** 5)
    const fit = fitLowTemperature({ temperatureK, heatCapacity: cut }, { terms: ['gamma', 'beta3', 'beta5'], windowK: [1, 7] }, { atomsPerFormulaUnit: 1 })
    expect(relativeDifference(fit.coefficients.gamma!.value, 0.69434)).toBeLessThan(1e-12)
    expect(relativeDifference(fit.coefficients.beta3!.value, 4.7548e-2)).toBeLessThan(1e-12)
    expect(relativeDifference(fit.coefficients.beta5!.value, 1.6314e-6)).toBeLessThan(1e-9)
  })
})

describe('C against T and C/T against T²', () => {
  const file = referenceJson<Record<string, { T: number[], C: number[], sigma_C: number[], exact: { beta: string[], se_absolute_sigma: string[], chi2: string } }>>('heat-capacity/k_weighted_regression.json')
  it('are the same fit with the errors that belong to them', () => {
    const set = file.k2_CoverT_vs_T2_constant_relative!
    const fit = fitLowTemperature({ temperatureK: set.T, heatCapacity: set.C, sigma: set.sigma_C }, { terms: ['gamma', 'beta3'], windowK: [1, 20] }, { atomsPerFormulaUnit: 1 })
    expect(fit).toMatchObject({ weights: 'stated-sigma', errorConvention: 'absolute' })
    expect(relativeDifference(fit.coefficients.gamma!.value, Number(set.exact.beta[0]))).toBeLessThan(1e-12)
    expect(relativeDifference(fit.coefficients.beta3!.value, Number(set.exact.beta[1]))).toBeLessThan(1e-12)
    expect(relativeDifference(fit.coefficients.gamma!.standardError, Number(set.exact.se_absolute_sigma[0]))).toBeLessThan(1e-12)
    expect(relativeDifference(fit.chiSquared, Number(set.exact.chi2))).toBeLessThan(1e-11)
  })
  it('differ when they are not weighted', () => {
    const note = (file as unknown as { note_identity: Record<string, number[]> }).note_identity
    const set = file.k2_CoverT_vs_T2_constant_relative!
    const fit = fitLowTemperature({ temperatureK: set.T, heatCapacity: set.C }, { terms: ['gamma', 'beta3'], windowK: [1, 20] }, { atomsPerFormulaUnit: 1, weights: 'uniform' })
    const expected = note['C vs (T,T^3), UNWEIGHTED (biased to high T)']!
    expect(relativeDifference(fit.coefficients.gamma!.value, expected[0]!)).toBeLessThan(1e-12)
    expect(relativeDifference(fit.coefficients.gamma!.standardError, note['its se']![0]!)).toBeLessThan(1e-11)
  })
})
