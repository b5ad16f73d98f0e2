import { describe, expect, it } from 'vitest'
import { parseFormula } from '#shared/heat-capacity/sample'
import { referenceTable, relativeDifference } from '../support/reference-data'

// IUPAC standard atomic weights 2016, as read in a second library; source in data/materials/SOURCE.md.
const WEIGHTS = referenceTable('materials/i_atomic_weights.csv')
const IUPAC = 'ASE 3.22.1 atomic_masses_iupac2016'

describe('molar masses against IUPAC standard atomic weights', () => {
  it('covers every element of the table', () => {
    expect(WEIGHTS.length).toBeGreaterThan(80)
  })

  it.each(WEIGHTS.filter(row => Number(row[IUPAC]) > 0).map(row => [row.symbol!, Number(row[IUPAC]), row.flag!]))('%s weighs %d g/mol', (symbol, weight, flag) => {
    const { molarMassGPerMol, atomsPerFormulaUnit } = parseFormula(symbol)
    expect(atomsPerFormulaUnit).toBe(1)
    // The table itself marks elements whose isotope-weighted mass lies further from the rounded standard weight.
    expect(relativeDifference(molarMassGPerMol, weight)).toBeLessThan(flag.includes('npm differs') ? 2e-4 : 1.1e-4)
  })
})
