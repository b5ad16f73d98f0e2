import { describe, expect, it } from 'vitest'
import { compareWithCopper, controlLimits, lastStandardReading } from '#shared/heat-capacity/copper-standard'
import { copperLaw } from '../../../support/heat-capacity-files'

const at = [0.5, 2, 4, 6, 30]
const day = (number: number) => new Date(Date.UTC(2027, 0, number))

describe('copper standard', () => {
  it('is compared point by point where the equation holds', () => {
    const factors = [1, 1.01, 0.98, 1.005, 1]
    const curve = { temperatureK: at, heatCapacity: at.map((t, index) => (t > 1 && t < 25 ? copperLaw(t) : 1) * factors[index]!), sigma: at.map(() => 0.01) }
    const comparison = compareWithCopper(curve)
    expect(comparison.pointCount).toBe(3)
    expect(comparison.temperatureRangeK).toEqual([2, 6])
    expect(comparison.points.map(point => point.deviationPercent.toFixed(6))).toEqual(['1.000000', '-2.000000', '0.500000'])
    expect(comparison.meanDeviationPercent).toBeCloseTo(-1 / 6, 9)
    expect(comparison.largestDeviationPercent).toBeCloseTo(-2, 9)
    expect(() => compareWithCopper({ temperatureK: [0.3], heatCapacity: [1] })).toThrowError(/No point lies between 1 K and 25 K/)
  })

  it('has limits of mean ± 2.66 mean moving range from five readings on', () => {
    expect(controlLimits([0, 1, 0, 1])).toBeUndefined()
    // Mean 0.4, moving ranges 1, 1, 1, 1: 0.4 ± 2.6596.
    const limits = controlLimits([0, 1, 0, 1, 0])!
    expect(limits.centre).toBeCloseTo(0.4, 12)
    expect(limits.high).toBeCloseTo(0.4 + 3 / 1.128, 12)
    expect(limits.low).toBeCloseTo(0.4 - 3 / 1.128, 12)
  })

  it('cites the last reading before the result, judged by the ones before it', () => {
    const readings = [0.1, 0.2, 0, 0.1, 0.2, 4].map((meanDeviationPercent, index) => ({ meanDeviationPercent, at: day(index + 1) }))
    const reading = lastStandardReading(readings, day(8))!
    expect(reading).toMatchObject({ meanDeviationPercent: 4, ageDays: 2 })
    expect(reading.limits![1]).toBeLessThan(1)
    expect(lastStandardReading(readings, day(3))).toEqual({ meanDeviationPercent: 0, ageDays: 0, limits: undefined })
    expect(lastStandardReading([], day(3))).toBeUndefined()
  })
})
