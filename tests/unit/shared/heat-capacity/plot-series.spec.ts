import { describe, expect, it } from 'vitest'
import { directSeries, fitLine, fittedHeatCapacity, moveWindowEdge, reducedSeries, thinSeries } from '#shared/heat-capacity/plot-series'

const curve = { temperatureK: [1, 2, 4], heatCapacity: [3, 10, -1], sigma: [0.1, 0.2, 0.4] }
const estimate = (value: number) => ({ value, standardError: 0.1, unit: '' })
const fit = { model: { terms: ['gamma', 'beta3', 'beta5', 'tail', 'constant'] as const, windowK: [1, 4] as const }, coefficients: { gamma: estimate(1), beta3: estimate(2), beta5: estimate(3), tail: estimate(4), constant: estimate(5) } }

describe('series of a heat-capacity plot', () => {
  it('evaluates every term of the fit', () => {
    // at 2 K: 1·2 + 2·8 + 3·32 + 4/4 + 5 = 120
    expect(fittedHeatCapacity(fit, 2)).toBe(120)
  })

  it('divides heat capacity and its error by T, against T²', () => {
    expect(reducedSeries(curve)).toEqual({ x: [1, 4, 16], y: [3, 5, -0.25], error: [0.1, 0.1, 0.1], index: [0, 1, 2] })
  })

  it('leaves out of logarithmic axes what is not above zero', () => {
    expect(directSeries(curve)).toEqual({ x: [1, 2], y: [3, 10], error: [0.1, 0.2], index: [0, 1] })
  })

  it('draws a straight line that meets the axis at γ', () => {
    const straight = { model: { terms: ['gamma', 'beta3'] as const, windowK: [1, 4] as const }, coefficients: { gamma: estimate(0.7), beta3: estimate(0.05) } }
    const line = fitLine(straight, [0, 4], 3)
    expect(line.x).toEqual([0, 8, 16])
    ;[0.7, 1.1, 1.5].forEach((expected, index) => expect(line.y[index]).toBeCloseTo(expected, 12))
  })

  it('thins a long series and keeps its spike', () => {
    const x = Array.from({ length: 10_000 }, (_, index) => index)
    const y = x.map(value => value === 7777 ? 99 : Math.sin(value / 500))
    const thin = thinSeries({ x, y, index: x }, 100)
    expect(thin.x.length).toBeLessThanOrEqual(200)
    expect(thin.index).toContain(7777)
    expect(thin.x).toEqual([...thin.x].sort((a, b) => a - b))
    expect(thinSeries({ x: [1], y: [1], index: [0] }, 100).x).toEqual([1])
  })

  it('moves an edge of the window by data points, and never past the other', () => {
    const temperatureK = [1, 2, 3, 5, 8]
    expect(moveWindowEdge(temperatureK, [1.5, 6], 'high', 1)).toEqual([1.5, 8])
    expect(moveWindowEdge(temperatureK, [1.5, 6], 'low', -1)).toEqual([1, 6])
    expect(moveWindowEdge(temperatureK, [1.5, 6], 'low', 9)).toEqual([6, 6])
    expect(moveWindowEdge(temperatureK, [1.5, 6], 'high', -9)).toEqual([1.5, 1.5])
    expect(moveWindowEdge(temperatureK, [3.1, 3.2], 'high', 1)).toEqual([3.1, 5])
  })
})
