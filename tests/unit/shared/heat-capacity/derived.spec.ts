import { describe, expect, it } from 'vitest'
import { derivedQuantities } from '#shared/heat-capacity/derived'
import { fitLowTemperature } from '#shared/heat-capacity/fit'
import type { HeatCapacitySample } from '#shared/heat-capacity/types'
import { metalLaw } from '../../../support/heat-capacity-files'

const temperatureK = Array.from({ length: 20 }, (_, index) => 1 + index * 0.2)
const law = metalLaw(0.695, 343)
const fit = fitLowTemperature({ temperatureK, heatCapacity: temperatureK.map(law), sigma: temperatureK.map(t => law(t) * 0.01) }, { terms: ['gamma', 'beta3'], windowK: [1, 4.8] }, { atomsPerFormulaUnit: 1 })
const copper: HeatCapacitySample = { formula: 'Cu', molarMassGPerMol: 63.546, atomsPerFormulaUnit: 1, kind: 'metal' }
const valueOf = (sample: HeatCapacitySample, id: string, inputs = {}) => derivedQuantities(fit, sample, inputs).find(each => each.id === id)?.value

describe('derived quantities', () => {
  it('are those of copper', () => {
    // Free-electron copper: 0.505 mJ/(mol K²) and 8.16 × 10⁴ K (C. Kittel, ch. 6, from memory; rounding of the density).
    expect(valueOf(copper, 'free-electron-gamma')).toBeCloseTo(0.505, 2)
    expect(valueOf(copper, 'mass-ratio')).toBeCloseTo(0.695 / 0.502, 2)
    expect(valueOf(copper, 'fermi-temperature')! / 8.16e4).toBeCloseTo(1, 1)
    // 2.357 mJ/(mol K²) for one state per eV and formula unit (tests/reference/data/materials/j_conversions.csv).
    expect(valueOf(copper, 'density-of-states')).toBeCloseTo(0.695 / 2.357, 3)
    // γT + β₃T³/3 at 4.8 K with β₃ = 1943.77 J · 1000/343³.
    expect(valueOf(copper, 'entropy')).toBeCloseTo(0.695 * 4.8 + 1943770 / 343 ** 3 * 4.8 ** 3 / 3, 2)
  })

  it('have the two ratios only when their inputs are entered', () => {
    expect(valueOf(copper, 'wilson-ratio')).toBeUndefined()
    expect(valueOf(copper, 'wilson-ratio', { susceptibilityEmuPerMol: 1e-5 })).toBeCloseTo(72.92 * 1e-5 / 0.695e-3, 2)
    expect(valueOf(copper, 'kadowaki-woods-ratio', { resistivityCoefficient: 1e-6 })).toBeCloseTo(1e-6 / 0.695 ** 2, 8)
  })

  it('leave the electrons out of an insulator, and carriers out where they are not known', () => {
    expect(derivedQuantities(fit, { ...copper, kind: 'insulator' }).map(each => each.id)).toEqual(['entropy'])
    expect(derivedQuantities(fit, { ...copper, formula: 'LaAl2' }).map(each => each.id)).toEqual(['density-of-states', 'entropy'])
  })
})
