import { describe, expect, it } from 'vitest'
import { solveLeastSquares } from '#shared/heat-capacity/least-squares'
import { referenceJson, referenceTable, relativeDifference } from '../support/reference-data'

interface NistSet {
  n: number
  p: number
  df: number
  model: string
  certified: { estimate: number[], se: number[], residual_sd: number, residual_ss: number }
  exact_recomputed: { estimate: string[], se: string[], residual_ss: string }
  data: number[][]
}

/** Columns of a NIST set's model: powers of x, x without intercept, or an intercept and six regressors. */
function designOf(set: NistSet): number[][] {
  const x = set.data.map(row => row.slice(1))
  if (set.model.includes('no intercept')) return [x.map(row => row[0]!)]
  if (set.p === 7) return [x.map(() => 1), ...Array.from({ length: 6 }, (_, j) => x.map(row => row[j]!))]
  return Array.from({ length: set.p }, (_, power) => x.map(row => row[0]! ** power))
}

/** Correct digits of the worst number; 15 is what the certified values have. */
function digits(actual: readonly number[], expected: readonly number[]): number {
  return Math.min(15, ...actual.map((value, index) => -Math.log10(relativeDifference(value, expected[index]!))))
}

// Digits to reach, coefficients and standard errors. Source: tests/reference/data/nist-linear/c_nist_methods_digits.csv, column
// "Householder QR" (numpy), rounded down; at most 14, since the certified numbers themselves are rounded to doubles. Filip, whose powers
// of x up to the tenth lose half of all digits before any method sees them, to 7, the number its collection asks for.
const asked = new Map(referenceTable('nist-linear/c_nist_methods_digits.csv').map((row) => {
  const [coefficients, errors] = row['Householder QR']!.split('/').map(each => Math.min(14, Math.floor(Number(each))))
  return [row.set!, row.set === 'Filip' ? { coefficients: 7, errors: 6.9 } : { coefficients: coefficients!, errors: errors! }] as const
}))

describe('NIST StRD, linear', () => {
  it.each([...asked.keys()])('%s to the digits asked', (name) => {
    const set = referenceJson<NistSet>(`nist-linear/${name}.json`)
    const solution = solveLeastSquares({ columns: designOf(set), values: set.data.map(row => row[0]!) })
    const goal = asked.get(name)!
    expect(solution.degreesOfFreedom).toBe(set.df)
    expect(digits(solution.coefficients, set.exact_recomputed.estimate.map(Number)), 'coefficients').toBeGreaterThanOrEqual(goal.coefficients)
    expect(digits(solution.scaledStandardErrors!, set.certified.se), 'standard errors').toBeGreaterThanOrEqual(goal.errors)
    expect(digits([Math.sqrt(solution.chiSquared / set.df)], [set.certified.residual_sd]), 'residual SD').toBeGreaterThanOrEqual(goal.errors)
  })
})

interface WeightedCase {
  x: number[]
  y: number[]
  s: number[]
  powers: number[]
  exact: { beta: string[], se_absolute_sigma: string[], se_scaled: string[], chi2: string, df: number, reduced_chi2: string, cov01: string | null }
}

describe('weighted regression against statsmodels, R and GSL', () => {
  const cases = Object.entries(referenceJson<Record<string, WeightedCase>>('heat-capacity/k_weighted_regression.json')).filter(([name]) => name.startsWith('k'))
  it('has the six cases of the file', () => expect(cases).toHaveLength(6))
  it.each(cases)('%s', (_, each) => {
    const solution = solveLeastSquares({ columns: each.powers.map(power => each.x.map(x => x ** power)), values: each.y, sigma: each.s })
    const { exact } = each
    expect(digits(solution.coefficients, exact.beta.map(Number))).toBeGreaterThan(11)
    expect(digits(solution.absoluteStandardErrors, exact.se_absolute_sigma.map(Number))).toBeGreaterThan(11)
    expect(digits(solution.scaledStandardErrors!, exact.se_scaled.map(Number))).toBeGreaterThan(11)
    expect(relativeDifference(solution.chiSquared, Number(exact.chi2))).toBeLessThan(1e-11)
    expect(solution.degreesOfFreedom).toBe(exact.df)
    if (exact.cov01 !== null) expect(relativeDifference(solution.absoluteCovariance[0]![1]!, Number(exact.cov01))).toBeLessThan(1e-10)
  })
})
