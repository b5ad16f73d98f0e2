import { describe, expect, it } from 'vitest'
import { debyeHeatCapacity, einsteinHeatCapacity } from '#shared/heat-capacity/debye'
import { fitCurveModel } from '#shared/heat-capacity/fit-model'
import { fitNonlinear } from '#shared/heat-capacity/nonlinear'
import { BCS_JUMP_RATIO, GAS_CONSTANT_J_PER_MOL_K } from '#shared/materials/constants'
import { referenceJson, referenceTable, relativeDifference } from '../support/reference-data'

// Data, independent numbers and licences: tests/reference/data/heat-capacity/SOURCE.md.
const provenance = referenceJson<{ analysis: Record<string, unknown> }[]>('heat-capacity/PROVENANCE.json')

describe('diamond of Weber and Einstein', () => {
  const rows = referenceTable('heat-capacity/F_diamond_weber1875_einstein1907.csv')
  const weber = rows.filter(row => row.source!.startsWith('Weber'))
  it('has the Einstein temperature that scipy finds, 1293.1 ± 15.1 K, unweighted', () => {
    expect(provenance[3]!.analysis['Einstein fit of the 12 Weber points']).toContain('1293.1 +- 15.1 K')
    const temperatureK = weber.map(row => Number(row.T_K))
    const fit = fitNonlinear({ evaluate: ([theta]) => temperatureK.map(t => 3 * einsteinHeatCapacity(t / theta!)), values: weber.map(row => Number(row.C_over_kB_per_atom)), start: [1000], positive: [true] })
    expect(fit.coefficients[0]!).toBeCloseTo(1293.1, 1)
    expect(fit.scaledStandardErrors![0]!).toBeCloseTo(15.1, 1)
  })
  it('has the Debye temperatures of its two coldest points', () => {
    for (const [temperature, key] of [['12.833', 'Debye T from 12.833 K point'], ['41.319', 'from 41.319 K']] as const) {
      const row = rows.find(each => each.T_K === temperature)!
      expect(relativeDifference(effectiveDebyeTemperature(Number(temperature), Number(row.C_over_kB_per_atom) / 3), provenance[3]!.analysis[key] as number), 'the file rounds C to six digits').toBeLessThan(1e-6)
    }
  })
})

/** Θ with debyeHeatCapacity(T/Θ) = share, by halving. */
function effectiveDebyeTemperature(temperatureK: number, share: number): number {
  let [low, high] = [temperatureK / 100, temperatureK * 1000]
  for (let step = 0; step < 200; step += 1) {
    const middle = (low + high) / 2
    if (debyeHeatCapacity(temperatureK / middle) > share) low = middle
    else high = middle
  }
  return (low + high) / 2
}

describe('silver from 7 to 205 K', () => {
  const rows = referenceTable('heat-capacity/E_Ag_1932_1941_facts.csv')
  const effective = provenance[2]!.analysis['effective Debye T (Cp treated as Cv + gamma T, gamma 0.646)'] as Record<string, number>
  it('has the Debye temperature of each point', () => {
    expect(Object.keys(effective)).toHaveLength(20)
    for (const [temperature, theta] of Object.entries(effective)) {
      const row = rows.find(each => Number(each.T_K) === Number(temperature))!
      const share = (Number(row.Cp_J_per_mol_K) - 0.646e-3 * Number(temperature)) / (3 * GAS_CONSTANT_J_PER_MOL_K)
      expect(effectiveDebyeTemperature(Number(temperature), share)).toBeCloseTo(theta, 1)
    }
  })
  it('is fitted as a whole by one Θ_D among them', () => {
    const curve = { temperatureK: rows.map(row => Number(row.T_K)), heatCapacity: rows.map(row => 1000 * Number(row.Cp_J_per_mol_K)) }
    const fit = fitCurveModel(curve, { id: 'debye', windowK: [5, 100], background: ['gamma'] }, { atomsPerFormulaUnit: 1 })
    expect(fit.parameters.debyeTemperature!.value).toBeGreaterThan(209)
    expect(fit.parameters.debyeTemperature!.value).toBeLessThan(216)
  })
})

describe('weak-coupling superconductor', () => {
  const rows = referenceTable('heat-capacity/b_bcs.csv').map(row => ({ t: Number(row['t=T/Tc']), heatCapacity: Number(row['C_es/(gamma Tc)']) }))
  it('jumps by 12/(7ζ(3)) at T_c', () => {
    expect(rows.at(-1)!.heatCapacity - 1).toBeCloseTo(BCS_JUMP_RATIO, 7)
  })
  it('is, well below T_c, the gapped exponential 8.5 e^(−1.44 T_c/T) of the textbooks', () => {
    // Common practice for 2.5 < T_c/T < 6 (from memory), hence the wide tolerance; the table itself is computed.
    const curve = { temperatureK: rows.map(row => row.t), heatCapacity: rows.map(row => row.heatCapacity) }
    const fit = fitCurveModel(curve, { id: 'gapped-exponential', windowK: [0.16, 0.41] }, { atomsPerFormulaUnit: 1 })
    expect(relativeDifference(fit.parameters.gap!.value, 1.44)).toBeLessThan(0.06)
    expect(relativeDifference(fit.parameters.prefactor!.value, 8.5)).toBeLessThan(0.15)
  })
})
