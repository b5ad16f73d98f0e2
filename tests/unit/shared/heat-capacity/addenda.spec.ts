import { describe, expect, it } from 'vitest'
import { subtractAddenda } from '#shared/heat-capacity/addenda'
import { analyseHeatCapacity } from '#shared/heat-capacity/analyse'
import { fitLowTemperature } from '#shared/heat-capacity/fit'
import { copperLaw } from '../../../support/heat-capacity-files'

const grid = (from: number, to: number, count: number) => Array.from({ length: count }, (_, index) => from + (to - from) * index / (count - 1))
const holder = (t: number) => 0.2 * t + 0.03 * t ** 3
const table = (temperatureK: number[], sigmaShare?: number) => ({
  kind: 'table' as const,
  curve: { temperatureK, heatCapacity: temperatureK.map(holder), ...(sigmaShare ? { sigma: temperatureK.map(t => holder(t) * sigmaShare) } : {}) },
})
const total = { temperatureK: grid(2, 6, 21), heatCapacity: grid(2, 6, 21).map(t => copperLaw(t) + holder(t)), sigma: grid(2, 6, 21).map(() => 0.03) }

describe('addenda', () => {
  it('are taken off between the points of their table', () => {
    const { curve, share } = subtractAddenda(total, table(grid(1.5, 7, 40)))
    curve.heatCapacity.forEach((value, index) => expect(Math.abs(value / copperLaw(curve.temperatureK[index]!) - 1)).toBeLessThan(1e-3))
    expect(share[0]).toBeCloseTo(holder(2) / (copperLaw(2) + holder(2)), 3)
  })

  it('are exact for a power of T, and on their own points', () => {
    const power = { kind: 'table' as const, curve: { temperatureK: [1, 8], heatCapacity: [0.05, 0.05 * 8 ** 3] } }
    const { curve } = subtractAddenda(total, power)
    curve.heatCapacity.forEach((value, index) => expect(value).toBeCloseTo(total.heatCapacity[index]! - 0.05 * curve.temperatureK[index]! ** 3, 10))
  })

  it('add their uncertainty in quadrature', () => {
    const at = [2, 3, 4, 5, 6]
    const { curve, hasUncertainty } = subtractAddenda({ temperatureK: at, heatCapacity: at.map(t => 10 * holder(t)), sigma: at.map(() => 0.03) }, table(at, 0.1))
    expect(hasUncertainty).toBe(true)
    // On a point of the table: √(0.03² + (0.1 · 0.64)²).
    expect(curve.sigma![0]).toBeCloseTo(Math.hypot(0.03, 0.064), 10)
  })

  it('may be a fit', () => {
    const at = grid(1, 8, 30)
    const fit = fitLowTemperature({ temperatureK: at, heatCapacity: at.map(holder), sigma: at.map(t => 0.01 * t) }, { terms: ['gamma', 'beta3'], windowK: [1, 8] }, { atomsPerFormulaUnit: 1 })
    const { curve } = subtractAddenda(total, { kind: 'fit', fit })
    curve.heatCapacity.forEach((value, index) => expect(value).toBeCloseTo(copperLaw(curve.temperatureK[index]!), 8))
    expect(curve.sigma![0]).toBeGreaterThan(0.03)
  })

  it('are never extrapolated inside the window', () => {
    expect(() => subtractAddenda(total, table(grid(3, 7, 10)))).toThrowError(/from 3 K to 7 K, but the sample was measured at 2 K\. Narrow the window/)
    const net = subtractAddenda(total, table(grid(3, 7, 40)), [3, 6])
    expect(net.indices[0]).toBe(5)
    expect(net.curve.temperatureK[0]).toBe(3)
  })

  it('leave the places of the points in an analysis those of the curve given', () => {
    const sample = { formula: 'Cu', molarMassGPerMol: 63.546, atomsPerFormulaUnit: 1, kind: 'metal' as const }
    const { fit, checks } = analyseHeatCapacity({ curve: total, sample, model: { terms: ['gamma', 'beta3'], windowK: [3, 6] }, addenda: table(grid(2.9, 7, 40)) })
    expect(fit.usedIndices[0]).toBe(5)
    expect(fit.coefficients.gamma!.value).toBeCloseTo(0.694, 1)
    expect(checks.find(check => check.id === 'addenda')).toMatchObject({ status: 'ok', unit: '' })
  })

  it('take the mean of repeats', () => {
    const repeated = { kind: 'table' as const, curve: { temperatureK: [1, 4, 4, 8], heatCapacity: [1, 3, 5, 8] } }
    const { curve } = subtractAddenda({ temperatureK: [4], heatCapacity: [10] }, repeated)
    expect(curve.heatCapacity[0]).toBeCloseTo(6, 12)
  })
})
