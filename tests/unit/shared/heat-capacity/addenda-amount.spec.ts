import { describe, expect, it } from 'vitest'
import { addendaPerMole, requireTotalUnit, WHOLE_HOLDER } from '#shared/heat-capacity/addenda-amount'
import { heatCapacityConversion } from '#shared/units/heat-capacity-units'

describe('addenda of the whole holder', () => {
  it('are kept in mJ/K', () => {
    // 2 µJ/K are 0.002 mJ/K
    expect(2 * heatCapacityConversion('µJ/K', WHOLE_HOLDER).factor).toBeCloseTo(0.002, 15)
  })

  it('are taken off per mole of the sample at hand', () => {
    // 63.546 mg of copper are 1 mmol: 0.001 mJ/K of the holder are 1 mJ/(mol K) of the sample
    const perMole = addendaPerMole({ temperatureK: [2], heatCapacity: [0.001], sigma: [0.0001] }, { molarMassGPerMol: 63.546, atomsPerFormulaUnit: 1, massMg: 63.546 })
    expect(perMole.heatCapacity[0]).toBeCloseTo(1, 12)
    expect(perMole.sigma![0]).toBeCloseTo(0.1, 12)
  })

  it('need the mass of the sample, and a unit of the whole', () => {
    expect(() => addendaPerMole({ temperatureK: [2], heatCapacity: [1] }, { molarMassGPerMol: 63.5, atomsPerFormulaUnit: 1 })).toThrow('mass of the sample')
    expect(() => requireTotalUnit('mJ/(mol K)')).toThrow('whole empty holder')
    expect(() => requireTotalUnit('nJ/K' as 'J/K')).toThrow()
    requireTotalUnit('µJ/K')
  })
})
