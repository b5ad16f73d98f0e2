import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { DomainError } from '#shared/errors'
import { fromMillijoulePerMolK, HEAT_CAPACITY_UNITS, heatCapacityConversion, parseHeatCapacityUnit, parseTemperatureUnit, toMillijoulePerMolK } from '#shared/units/heat-capacity-units'

const copper = { molarMassGPerMol: 63.546, atomsPerFormulaUnit: 1, massMg: 412.6, densityGPerCm3: 8.96 }
const sapphire = { molarMassGPerMol: 101.96, atomsPerFormulaUnit: 5 }

describe('units of heat capacity', () => {
  it('knows four energies per six amounts', () => {
    expect(HEAT_CAPACITY_UNITS).toHaveLength(24)
    expect(HEAT_CAPACITY_UNITS).toContain('µJ/(cm³ K)')
  })

  it('converts as a sum by hand does', () => {
    // 1 J/(g K) of copper is 63.546 J/(mol K).
    expect(toMillijoulePerMolK(1, 'J/(g K)', copper)).toBeCloseTo(63546, 8)
    expect(toMillijoulePerMolK(1, 'mJ/(kg K)', copper)).toBeCloseTo(0.063546, 12)
    // Five atoms in Al2O3.
    expect(toMillijoulePerMolK(2, 'mJ/(g-atom K)', sapphire)).toBe(10)
    // One thermochemical calorie is 4.184 J by definition.
    expect(toMillijoulePerMolK(1, 'cal/(mol K)', copper)).toBe(4184)
    // Molar volume of copper 63.546/8.96 = 7.0922 cm³/mol.
    expect(toMillijoulePerMolK(1, 'mJ/(cm³ K)', copper)).toBeCloseTo(7.0922, 4)
    // 412.6 mg are 6.4930 mmol; 1 µJ/K of them is 0.154014 mJ/(mol K).
    expect(toMillijoulePerMolK(1, 'µJ/K', copper)).toBeCloseTo(0.154014, 6)
  })

  it('says what a conversion rests on', () => {
    expect(heatCapacityConversion('J/K', copper).uses).toEqual(['molar mass 63.546 g/mol', 'mass 412.6 mg'])
    expect(heatCapacityConversion('mJ/(mol K)', copper).uses).toEqual([])
  })

  it('refuses without the mass or the density, naming the remedy', () => {
    expect(() => heatCapacityConversion('J/K', sapphire)).toThrowError(/mass is needed\. Enter the mass/)
    expect(() => heatCapacityConversion('J/(cm³ K)', sapphire)).toThrowError(/density of the sample is needed\. Enter the density/)
    expect(() => heatCapacityConversion('J/K', { ...copper, massMg: 0 })).toThrowError(DomainError)
  })

  it('comes back to the same number by every unit', () => {
    const positive = { min: Math.fround(1e-3), max: Math.fround(1e4), noNaN: true }
    fc.assert(fc.property(fc.constantFrom(...HEAT_CAPACITY_UNITS), fc.double({ min: 1e-9, max: 1e6, noNaN: true }), fc.double(positive), fc.double(positive), fc.double(positive), fc.double({ min: 1, max: 60, noNaN: true }), (unit, value, molarMassGPerMol, massMg, densityGPerCm3, atomsPerFormulaUnit) => {
      const facts = { molarMassGPerMol, massMg, densityGPerCm3, atomsPerFormulaUnit }
      const back = fromMillijoulePerMolK(toMillijoulePerMolK(value, unit, facts), unit, facts)
      expect(Math.abs(back - value)).toBeLessThanOrEqual(1e-14 * Math.abs(value))
    }))
  })

  it('reads back every unit it shows', () => {
    for (const unit of HEAT_CAPACITY_UNITS) expect(parseHeatCapacityUnit(unit)).toBe(unit)
  })

  it.each([
    ['mJ mol^-1 K^-1', 'mJ/(mol K)'], ['mJ mol-1 K-1', 'mJ/(mol K)'], ['mJ·mol⁻¹·K⁻¹', 'mJ/(mol K)'], ['mJ/mol/K', 'mJ/(mol K)'], ['mJ/mol-K', 'mJ/(mol K)'],
    ['mJ/mol K', 'mJ/(mol K)'], ['mJ/(mol*K)', 'mJ/(mol K)'], ['J_per_mol_K', 'J/(mol K)'], ['J per mol per K', 'J/(mol K)'], ['J_per_kg_K', 'J/(kg K)'],
    ['uJ/K', 'µJ/K'], ['μJ/K', 'µJ/K'], ['µJ K^-1', 'µJ/K'], ['J/K', 'J/K'], ['cal/(g-atom K)', 'cal/(g-atom K)'], ['J/gat-K', 'J/(g-atom K)'],
    ['J/(cm^3 K)', 'J/(cm³ K)'], ['J/cm3/K', 'J/(cm³ K)'], ['J cm^-3 K^-1', 'J/(cm³ K)'], ['[J/(g K)]', 'J/(g K)'], ['J/mol f.u./K', 'J/(mol K)'],
  ])('reads %s as %s', (text, unit) => {
    expect(parseHeatCapacityUnit(text)).toBe(unit)
  })

  it.each(['mJ/mol', 'J/(mol K2)', 'mJ/(mol K^2)', 'J mol K', 'MJ/(mol K)', 'W/K', 'J', '', 'J/(mol g K)', 'Joule'])('does not take %s for one', (text) => {
    expect(parseHeatCapacityUnit(text)).toBeUndefined()
  })

  it('tells K from mK', () => {
    expect([parseTemperatureUnit('K'), parseTemperatureUnit('Kelvin'), parseTemperatureUnit('mK'), parseTemperatureUnit('MK'), parseTemperatureUnit('°C')]).toEqual(['K', 'K', 'mK', undefined, undefined])
  })
})
