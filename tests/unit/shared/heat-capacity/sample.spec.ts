import { describe, expect, it } from 'vitest'
import { parseFormula, parseMass, plainFormula } from '#shared/heat-capacity/sample'

describe('formula', () => {
  // Sums by hand of IUPAC 2016 standard atomic weights (La 138.90547, Sr 87.62, Cu 63.546, O 15.999, S 32.06, H 1.008, Al 26.9815385, Zn 65.38).
  it.each([
    ['Cu', 63.546, 1],
    ['Al2O3', 101.960, 5],
    ['Al₂O₃', 101.960, 5],
    ['La1.85Sr0.15CuO4', 397.660, 7],
    ['La1,85Sr0,15CuO4', 397.660, 7],
    ['La1.85 Sr.15CuO4', 397.660, 7],
    ['Cu.5Zn.5', 64.463, 1],
    ['CuSO4 . 5H2O', 249.677, 21],
    ['CuSO4·5H2O', 249.677, 21],
    ['CuSO4.5H2O', 249.677, 21],
    ['CuSO4 · 5 H2O', 249.677, 21],
    ['CuSO₄•0.5H₂O', 168.609, 7.5],
    ['CuSO4.0.5H2O', 168.609, 7.5],
    ['Ba(Fe0.92Co0.08)2As2', 399.352, 5],
    ['[63Cu]', 62.9296, 1],
    ['[13C]O2', 45.0013, 3],
  ])('%s has its molar mass and atoms', (formula, molarMass, atoms) => {
    const facts = parseFormula(formula)
    // The library weighs isotopes; sulphur differs by 1.5e-4 from the rounded standard weight.
    expect(Math.abs(facts.molarMassGPerMol / molarMass - 1)).toBeLessThan(1.5e-4)
    expect(facts.atomsPerFormulaUnit).toBe(atoms)
  })

  it('shows the hydrate as it was understood', () => {
    expect(plainFormula('CuSO₄·5H₂O')).toBe('CuSO4 . 5H2O')
    expect(plainFormula('NaCl.H2O')).toBe('NaCl . H2O')
    expect(plainFormula('YBa2Cu3O6.95')).toBe('YBa2Cu3O6.95')
  })

  it.each(['', '  ', 'cu', 'Xx', 'copper', 'Cu2+', '12', 'Cu(', 'Al2O3)', '<script>', '💎', 'H'.repeat(200), '()', '...'])('refuses “%s” with a sentence', (formula) => {
    expect(() => parseFormula(formula)).toThrowError(/\. (Write|Enter)|^Enter/)
  })
})

describe('mass', () => {
  it.each([['412.6mg', 412.6], ['0.4126 g', 412.6], ['412,6 mg', 412.6], ['3.2µg', 0.0032], ['3.2ug', 0.0032], ['1kg', 1e6]])('reads %s', (text, massMg) => {
    expect(parseMass(text).massMg).toBeCloseTo(massMg, 9)
  })

  it('reads the uncertainty in both spellings', () => {
    expect(parseMass('412.6(2)mg').massUncertaintyMg).toBeCloseTo(0.2, 12)
    expect(parseMass('0.4126±0.0002g').massUncertaintyMg).toBeCloseTo(0.2, 12)
    expect(parseMass('412.6mg').massUncertaintyMg).toBeUndefined()
  })

  it.each(['412.6', '0mg', '-3mg', 'heavy', '4 lb', ''])('refuses “%s” with the remedy', (text) => {
    expect(() => parseMass(text)).toThrowError(/Write/)
  })
})
