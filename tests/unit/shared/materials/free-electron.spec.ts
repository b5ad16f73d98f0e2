import { describe, expect, it } from 'vitest'
import { DomainError } from '#shared/errors'
import {
  AVOGADRO_CONSTANT_PER_MOL, BCS_JUMP_RATIO, BOHR_MAGNETON_J_PER_T, BOLTZMANN_CONSTANT_J_PER_K, DEBYE_T3_CONSTANT_J_PER_MOL_K, ELECTRON_MASS_KG,
  ELEMENTARY_CHARGE_C, GAMMA_MJ_PER_MOL_K2_PER_STATE_PER_EV, GAS_CONSTANT_J_PER_MOL_K, PLANCK_CONSTANT_J_S, REDUCED_PLANCK_CONSTANT_J_S,
} from '#shared/materials/constants'
import { COPPER_REFERENCE_RANGE_K, copperReferenceHeatCapacity } from '#shared/materials/copper-reference'
import { handbookEntry } from '#shared/materials/elements'
import { densityOfStatesPerEV, freeElectronGas, kadowakiWoodsRatio, wilsonRatio } from '#shared/materials/free-electron'
import { referenceJson, referenceTable, relativeDifference } from '../../../support/reference-data'

// Expected numbers: tests/reference/data/materials, see SOURCE.md there.
const metals = referenceTable('materials/d_elements_metals.csv')

describe('constants', () => {
  const table = new Map(referenceTable('materials/a_constants.csv').map(row => [row.symbol!, row['CODATA 2022']!]))
  it.each<[string, number]>([
    ['k_B', BOLTZMANN_CONSTANT_J_PER_K], ['N_A', AVOGADRO_CONSTANT_PER_MOL], ['h', PLANCK_CONSTANT_J_S], ['e', ELEMENTARY_CHARGE_C],
    ['R = k_B N_A', GAS_CONSTANT_J_PER_MOL_K], ['hbar = h/2pi', REDUCED_PLANCK_CONSTANT_J_S], ['m_e', ELECTRON_MASS_KG], ['mu_B', BOHR_MAGNETON_J_PER_T],
  ])('%s is that of CODATA 2022', (symbol, value) => {
    // The table prints ten digits.
    expect(relativeDifference(value, Number.parseFloat(table.get(symbol)!))).toBeLessThan(1e-9)
  })
  it('derive the three prefactors of the field', () => {
    expect(DEBYE_T3_CONSTANT_J_PER_MOL_K).toBeCloseTo(1943.7701905692, 9)
    expect(GAMMA_MJ_PER_MOL_K2_PER_STATE_PER_EV).toBeCloseTo(2.35714101437, 10)
    expect(BCS_JUMP_RATIO).toBeCloseTo(1.42612692, 7)
  })
})

describe('free electrons', () => {
  const free = metals.filter(row => row['gamma_free computed mJ/mol/K2'] !== '')
  it.each(free.map(row => [row.symbol!, row]))('gives γ₀, E_F and T_F of %s from valence, mass and density', (_, row) => {
    const gas = freeElectronGas({
      electronsPerFormulaUnit: Number(row['valence z']),
      molarMassGPerMol: Number(row['standard atomic weight (periodictable 1.6.0)']),
      densityGPerCm3: Number(row['density used g/cm3']),
    })
    expect(relativeDifference(gas.gamma0, Number(row['gamma_free computed mJ/mol/K2']))).toBeLessThan(6e-4)
    expect(relativeDifference(gas.fermiEnergyEV, Number(row['E_F eV']))).toBeLessThan(6e-4)
    expect(relativeDifference(gas.fermiTemperatureK, Number(row['T_F K']))).toBeLessThan(6e-5)
    expect(relativeDifference(gas.carrierDensityPerM3, Number(row['n_e 1e28/m3']) * 1e28)).toBeLessThan(6e-4)
  })

  it('gives the alkali metals with the density of the cold crystal', () => {
    const masses = new Map(metals.map(row => [row.symbol!, Number(row['standard atomic weight (periodictable 1.6.0)'])]))
    const rows = referenceTable('materials/d_alkali_low_T_density.csv')
    expect(rows).toHaveLength(5)
    for (const row of rows) {
      const { gamma0 } = freeElectronGas({ electronsPerFormulaUnit: 1, molarMassGPerMol: masses.get(row.symbol!)!, densityGPerCm3: Number(row['density low T g/cm3']) })
      expect(relativeDifference(gamma0, Number(row['gamma_free low T computed'])), row.symbol).toBeLessThan(2e-4)
    }
  })

  it('counts electrons per formula unit: two formula units of one electron are one of two', () => {
    // γ₀ ∝ z/n^(2/3): with z and M doubled the density n is the same and γ₀ per mole doubles.
    const one = freeElectronGas({ electronsPerFormulaUnit: 1, molarMassGPerMol: 50, densityGPerCm3: 5 })
    const two = freeElectronGas({ electronsPerFormulaUnit: 2, molarMassGPerMol: 100, densityGPerCm3: 5 })
    expect(two.gamma0).toBeCloseTo(2 * one.gamma0, 12)
    expect(two.fermiTemperatureK).toBeCloseTo(one.fermiTemperatureK, 6)
  })

  it.each([
    [{ electronsPerFormulaUnit: 0, molarMassGPerMol: 63.5, densityGPerCm3: 9 }, 'conductionElectrons'],
    [{ electronsPerFormulaUnit: 1, molarMassGPerMol: Number.NaN, densityGPerCm3: 9 }, 'molarMassGPerMol'],
    [{ electronsPerFormulaUnit: 1, molarMassGPerMol: 63.5, densityGPerCm3: -9 }, 'densityGPerCm3'],
  ])('refuses %o at the right field', (carriers, field) => {
    expect(() => freeElectronGas(carriers)).toThrow(DomainError)
    try {
      freeElectronGas(carriers)
    }
    catch (error) {
      expect((error as DomainError).path).toEqual([field])
    }
  })
})

describe('quantities derived from γ', () => {
  it('counts the states at the Fermi level of copper', () => {
    expect(densityOfStatesPerEV(0.695)).toBeCloseTo(0.294849, 6) // j_conversions.csv
  })
  it('gives the Wilson ratio of the worked example', () => {
    expect(wilsonRatio(1e-3, 40)).toBeCloseTo(1.82285, 5) // j_conversions.csv; prefactor 72913.83
  })
  it('gives the Kadowaki–Woods ratio of the worked example', () => {
    expect(kadowakiWoodsRatio(1.6, 400)).toBeCloseTo(1e-5, 12) // j_conversions.csv
  })
  it('refuses ratios of a γ that is not above zero', () => {
    expect(() => wilsonRatio(1e-3, 0)).toThrow('γ must be above zero')
    expect(() => kadowakiWoodsRatio(1, -2)).toThrow('γ must be above zero')
  })
})

describe('copper reference equation', () => {
  const reference = referenceJson<{ A: Record<string, number> }>('heat-capacity/e_copper_reference.json')
  const table = referenceTable('heat-capacity/e_copper_heat_capacity.csv')
  it.each(table.map(row => [Number(row['T K']), Number(row['copper reference equation C mJ/(mol K)'])]).filter(([t]) => t! <= 25))('at %d K is %d mJ/(mol K)', (t, expected) => {
    expect(relativeDifference(copperReferenceHeatCapacity(t!), expected!)).toBeLessThan(6e-6)
  })
  it('has the six coefficients of the data file', () => {
    const sum = Object.entries(reference.A).reduce((total, [power, coefficient]) => total + coefficient * 12.5 ** Number(power), 0)
    expect(copperReferenceHeatCapacity(12.5)).toBeCloseTo(sum, 10)
  })
  it('refuses temperatures outside its range', () => {
    expect(() => copperReferenceHeatCapacity(30)).toThrow('holds from')
    expect(COPPER_REFERENCE_RANGE_K[1]).toBe(25)
  })
})

describe('handbook', () => {
  it.each(metals.map(row => [row.symbol!, row]))('has %s as its source has it', (symbol, row) => {
    const entry = handbookEntry(symbol)!
    expect(entry.kind).toBe('metal')
    expect(entry.densityGPerCm3).toBe(Number(row['density used g/cm3']))
    expect(entry.conductionElectrons).toBe(row['valence z'] === '' ? undefined : Number(row['valence z']))
    const quoted = Number(row['gamma_exp Kittel (memory) mJ/mol/K2'])
    expect(entry.gammaRange[0]).toBeLessThanOrEqual(quoted)
    expect(entry.gammaRange[1]).toBeGreaterThanOrEqual(quoted)
    expect(entry.gamma).toBeGreaterThanOrEqual(entry.gammaRange[0])
    expect(entry.gamma).toBeLessThanOrEqual(entry.gammaRange[1])
    for (const column of ['Theta_D Kittel (memory) K', 'Theta_D low-T JLindemann JSON K', 'Theta_D list S K']) {
      if (row[column] === '' || row[column] === '---') continue
      expect(entry.debyeTemperatureRangeK[0]).toBeLessThanOrEqual(Number(row[column]))
      expect(entry.debyeTemperatureRangeK[1]).toBeGreaterThanOrEqual(Number(row[column]))
    }
    const critical = row['Tc modern (memory) K']!
    expect(entry.criticalTemperatureK).toBe(critical === '' ? undefined : Number(critical))
    expect(entry.source).toContain('from memory')
  })
  it('has the insulators with zero γ and their atoms per formula unit', () => {
    for (const row of referenceTable('materials/d_insulators.csv')) {
      const entry = handbookEntry(row.material!.split(' ')[0]!)!
      expect(entry).toMatchObject({ kind: 'insulator', gamma: 0, atomsPerFormulaUnit: Number(row['atoms per f.u.']), debyeTemperatureK: Number(row['Theta_D(0) K (memory)']) })
    }
  })
  it('reads subscripts and a needless 1, and knows nothing of what is not there', () => {
    expect(handbookEntry('Al₂O₃')?.name).toBe('sapphire')
    expect(handbookEntry(' Cu1 ')?.name).toBe('copper')
    expect(handbookEntry('YBa2Cu3O7')).toBeUndefined()
    expect(handbookEntry('C12')).toBeUndefined()
  })
})
