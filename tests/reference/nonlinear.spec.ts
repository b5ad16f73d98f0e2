import { describe, expect, it } from 'vitest'
import { fitNonlinear } from '#shared/heat-capacity/nonlinear'
import { referenceJson, relativeDifference } from '../support/reference-data'

interface NistSet {
  df: number
  start1: number[]
  start2: number[]
  certified: { estimate: number[], se: number[], residual_ss: number }
  data: [y: number, x: number][]
}

type Model = (b: readonly number[], x: number) => number
const rational: Model = ([b1, b2, b3, b4, b5, b6, b7], x) => (b1! + b2! * x + b3! * x ** 2 + b4! * x ** 3) / (1 + b5! * x + b6! * x ** 2 + b7! * x ** 3)
const saturating: Model = ([b1, b2], x) => b1! * (1 - Math.exp(-b2! * x))

// Models and certified values: tests/reference/data/nist-nonlinear, see SOURCE.md there.
const models: Record<string, Model> = {
  Misra1a: saturating,
  BoxBOD: saturating,
  DanWood: ([b1, b2], x) => b1! * x ** b2!,
  Eckerle4: ([b1, b2, b3], x) => b1! / b2! * Math.exp(-0.5 * ((x - b3!) / b2!) ** 2),
  MGH09: ([b1, b2, b3, b4], x) => b1! * (x * x + x * b2!) / (x * x + x * b3! + b4!),
  Thurber: rational,
  Hahn1: rational,
}

describe('NIST StRD, nonlinear, to 6 digits from both starts', () => {
  it.each(Object.keys(models).flatMap(name => [[name, 'start1'], [name, 'start2']] as [string, 'start1' | 'start2'][]))('%s from %s', (name, start) => {
    const set = referenceJson<NistSet>(`nist-nonlinear/${name}.json`)
    const solution = fitNonlinear({ evaluate: b => set.data.map(([, x]) => models[name]!(b, x)), values: set.data.map(([y]) => y), start: set[start] })
    expect(solution.degreesOfFreedom).toBe(set.df)
    set.certified.estimate.forEach((value, j) => {
      expect(relativeDifference(solution.coefficients[j]!, value), `parameter ${j + 1}`).toBeLessThan(1e-6)
      expect(relativeDifference(solution.scaledStandardErrors![j]!, set.certified.se[j]!), `standard error ${j + 1}`).toBeLessThan(1e-6)
    })
    expect(relativeDifference(solution.chiSquared, set.certified.residual_ss)).toBeLessThan(1e-9)
  })
})
