import { describe, expect, it } from 'vitest'
import { analyseDataset, type DatasetAnalysisInput, fitDataset, netCurve } from '#shared/heat-capacity/analyse-dataset'
import { copperReferenceHeatCapacity } from '#shared/materials/copper-reference'

const temperatureK = Array.from({ length: 30 }, (_, index) => 1.5 + index * 0.2)
const heatCapacity = temperatureK.map(copperReferenceHeatCapacity)
const input: DatasetAnalysisInput = {
  curve: { temperatureK, heatCapacity, sigma: heatCapacity.map(value => value * 0.005) },
  sample: { formula: 'Cu', molarMassGPerMol: 63.546, atomsPerFormulaUnit: 1, kind: 'metal', massMg: 63.546, massUncertaintyMg: 0.63546 },
  model: { terms: ['gamma', 'beta3'], windowK: [1.5, 6] },
  unit: 'mJ/(mol K)',
  thresholds: {},
}

describe('analysing a stored dataset', () => {
  it('gives while dragging the very numbers that are saved', () => {
    const holder = { temperatureK: [1, 8], heatCapacity: [0.0005, 0.004] }
    const correction = { id: 'divide-by-1000' as const, factor: 0.001, message: '' }
    const scaled = { ...input.curve, heatCapacity: heatCapacity.map(value => value * 1000), sigma: input.curve.sigma!.map(value => value * 1000) }
    for (const each of [input, { ...input, holder }, { ...input, curve: scaled, correction }]) {
      const fitted = fitDataset(each).fit
      const { fit } = analyseDataset(each)
      expect(fitted.coefficients).toEqual(fit.coefficients)
      expect(fitted.debyeTemperature).toEqual(fit.debyeTemperature)
      expect(fitted.reducedChiSquared).toBe(fit.reducedChiSquared)
    }
  })

  it('takes the correction into the curve and addenda off it', () => {
    const corrected = netCurve({ ...input, correction: { id: 'divide-by-1000', factor: 0.001, message: '' } })
    expect(corrected.heatCapacity[3]).toBeCloseTo(heatCapacity[3]! / 1000, 12)
    // 1 mmol of copper: 0.001 mJ/K of the holder at 2 K are 1 mJ/(mol K); its C is proportional to T.
    const net = netCurve({ ...input, holder: { temperatureK: [1, 8], heatCapacity: [0.0005, 0.004] } })
    expect(net.heatCapacity[3]).toBeCloseTo(heatCapacity[3]! - 0.5 * temperatureK[3]!, 10)
  })

  it('counts points in the curve that is drawn, also where addenda do not reach', () => {
    const { curve, fit } = fitDataset({ ...input, holder: { temperatureK: [1.5, 6.05], heatCapacity: [0.0001, 0.0004] } })
    expect(curve.temperatureK.length).toBeLessThan(temperatureK.length)
    expect(fit.usedIndices.every(index => curve.temperatureK[index]! <= 6)).toBe(true)
  })
})
