import { describe, expect, it } from 'vitest'
import { directSeries, fitLine, fittedHeatCapacity, reducedSeries, stepToPoint } from '#shared/heat-capacity/plot-series'

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

  it('moves an edge from point to point, from between two as well, and never out of the data', () => {
    const temperatureK = [1, 2, 3, 5, 8]
    expect(stepToPoint(temperatureK, 3, 1)).toBe(5)
    expect(stepToPoint(temperatureK, 3, -1)).toBe(2)
    expect(stepToPoint(temperatureK, 4, 1)).toBe(5)
    expect(stepToPoint(temperatureK, 4, -1)).toBe(3)
    expect(stepToPoint(temperatureK, 3, -10)).toBe(1)
    expect(stepToPoint(temperatureK, 3, 10)).toBe(8)
    expect(stepToPoint(temperatureK, 0.5, 1)).toBe(1)
    expect(stepToPoint([], 4, 1)).toBe(4)
  })
})
