import { describe, expect, it } from 'vitest'
import { EIGHTY_PERCENT_Z } from '#shared/helium/eighty-percent'
import { cooldownLitres, gasUseShareFromCooldown } from '#shared/planning/cooldown'
import { eightyPercent, learn, learnGasUseShare, learnMeasureFactor, learnPhaseHours, learnStaticBoilOff } from '#shared/planning/learning'
import { finished, PETREL } from './builders'

/** A fixed stream of normal numbers: a linear congruential generator (Numerical Recipes constants) and Box–Muller. */
function normals(seed: number): () => number {
  let state = seed
  const uniform = (): number => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0
    return (state + 0.5) / 2 ** 32
  }
  return () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform())
}

describe('learning from a prior and finished runs', () => {
  it('is the prior without a past', () => {
    expect(learn({ mean: 6, sd: 2 }, [])).toEqual({ mean: 6, sd: 2, count: 0 })
  })

  it('moves the mean as if the prior were two runs', () => {
    // (2 × 6 + 3 × 9)/5 = 7.8.
    expect(learn({ mean: 6, sd: 2 }, [8, 9, 10]).mean).toBeCloseTo(7.8, 12)
  })

  it('has the spread of the next run', () => {
    // By hand: weight 5, shape 2 + 1.5 = 3.5, prior scale 4 × 1 × 2/3 = 2.66667, scatter 2/2 = 1,
    // shift 2 × 3 × 9/(2 × 5) = 5.4; scale 9.06667; sd² = 9.06667 × 6/(5 × 2.5) = 4.352.
    expect(learn({ mean: 6, sd: 2 }, [8, 9, 10]).sd ** 2).toBeCloseTo(4.352, 10)
  })

  it('forgets the prior when runs are many and agree', () => {
    const learned = learn({ mean: 6, sd: 2 }, Array.from({ length: 400 }, (_, i) => 10 + (i % 2 ? 0.1 : -0.1)))
    expect(Math.abs(learned.mean - 10)).toBeLessThan(0.03)
    expect(learned.sd).toBeLessThan(0.35)
  })

  it('covers about 80 % of next runs', () => {
    const normal = normals(20260)
    let inside = 0
    const trials = 4000
    for (let trial = 0; trial < trials; trial++) {
      const truth = 6 + 1.2 * normal()
      const past = Array.from({ length: 8 }, () => truth + 1.5 * normal())
      const { low, high } = eightyPercent(learn({ mean: 6, sd: 2 }, past))
      const next = truth + 1.5 * normal()
      if (next >= low && next <= high) inside++
    }
    // Standard error of the share 0.6 %; the interval is not exactly calibrated, so ± 3 %.
    expect(inside / trials).toBeGreaterThan(0.77)
    expect(inside / trials).toBeLessThan(0.83)
  })

  it('refuses a prior without spread and values that are no numbers', () => {
    expect(() => learn({ mean: 1, sd: 0 }, [])).toThrow(/spread/)
    expect(() => learn({ mean: 1, sd: 1 }, [Number.NaN])).toThrow(/finite/)
  })

  it('cuts an interval off at its bound', () => {
    expect(eightyPercent({ mean: 1, sd: 10 })).toEqual({ low: 0, likely: 1, high: 1 + EIGHTY_PERCENT_Z * 10 })
  })
})

describe('what a cryostat teaches', () => {
  it('finds again the share of the gas enthalpy that a cooldown used', () => {
    for (const share of [0, 0.05, 0.37, 0.8, 1]) {
      const litres = cooldownLitres(PETREL.coldMass, 77, share)
      expect(gasUseShareFromCooldown(PETREL.coldMass, 77, litres)).toBeCloseTo(share, 8)
    }
    expect(gasUseShareFromCooldown(PETREL.coldMass, 77, 1000)).toBe(0)
    expect(gasUseShareFromCooldown(PETREL.coldMass, 77, 0.01)).toBe(1)
    expect(() => gasUseShareFromCooldown(PETREL.coldMass, 77, 0)).toThrow(/learned only/)
    expect(() => gasUseShareFromCooldown([], 77, 5)).toThrow(/learned only/)
  })

  it('learns the share from its own runs only', () => {
    const used = cooldownLitres(PETREL.coldMass, 77, 0.7)
    const history = [
      ...Array.from({ length: 8 }, (_, i) => finished(`r${i}`, { cooldownLitres: used })),
      finished('other', { cryostatId: 'fulmar', cooldownLitres: 1 }),
      finished('unlogged'),
    ]
    const learned = learnGasUseShare(PETREL, history)
    expect(learned.count).toBe(8)
    expect(learned.mean).toBeCloseTo((2 * 0.4 + 8 * 0.7) / 10, 6)
  })

  it('learns hours of cooling to base apart with and without nitrogen', () => {
    const history = [
      finished('a', { phaseHours: { 'cool-to-base': 5, 'warm-up': 20 } }),
      finished('b', { nitrogenPrecool: false, startTemperatureK: 300, phaseHours: { 'cool-to-base': 15, 'warm-up': 22 } }),
    ]
    expect(learnPhaseHours(PETREL, history, 'cool-to-base', true)).toMatchObject({ count: 1, mean: (2 * 6 + 5) / 3 })
    expect(learnPhaseHours(PETREL, history, 'cool-to-base', false)).toMatchObject({ count: 1, mean: (2 * 6 + 15) / 3 })
    expect(learnPhaseHours(PETREL, history, 'warm-up', true).count).toBe(2)
  })

  it('learns static boil-off and how measurements keep to their plan', () => {
    const history = [
      finished('a', { staticBoilOffLitresPerHour: 0.36, phaseHours: { measure: 30 }, plannedMeasureHours: 20 }),
      finished('b', { phaseHours: { measure: 30 } }),
    ]
    expect(learnStaticBoilOff(PETREL, history)).toMatchObject({ count: 1, mean: (2 * 0.3 + 0.36) / 3 })
    const factor = learnMeasureFactor(PETREL, history)
    expect(factor.count).toBe(1)
    expect(factor.mean).toBeCloseTo((2 + 1.5) / 3, 12)
  })
})
