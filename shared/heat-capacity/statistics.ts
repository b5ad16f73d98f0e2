/**
 * Complementary error function, relative error under 1.2 × 10⁻⁷.
 * Source: W. H. Press et al., Numerical Recipes, 2nd ed., 6.2 (erfcc).
 *
 * @param x any number
 */
export function erfc(x: number): number {
  const t = 1 / (1 + Math.abs(x) / 2)
  const polynomial = [-1.26551223, 1.00002368, 0.37409196, 0.09678418, -0.18628806, 0.27886807, -1.13520398, 1.48851587, -0.82215223, 0.17087277]
    .reduceRight((sum, coefficient) => sum * t + coefficient, 0)
  const value = t * Math.exp(-x * x + polynomial)
  return x >= 0 ? value : 2 - value
}

/** Runs of equal sign in a row of residuals. */
export interface RunsTest {
  readonly runs: number
  readonly expectedRuns: number
  /** Probability of so few runs or fewer, were the signs random. */
  readonly pValue: number
}

/** Up to this many of the rarer sign the distribution is summed exactly. */
const EXACT_UP_TO = 40

/**
 * Runs test for residuals in the order of temperature: too few runs mean that the model bends away from the points.
 * Source: A. Wald and J. Wolfowitz, Ann. Math. Stat. 11, 147 (1940).
 *
 * @param residuals in order; zeros are passed over
 * @returns runs, expected runs and the one-sided probability; 1 when all have one sign and there are fewer than two
 */
export function runsTest(residuals: readonly number[]): RunsTest {
  const signs = residuals.filter(value => value !== 0).map(value => value > 0)
  const positive = signs.filter(Boolean).length
  const negative = signs.length - positive
  const runs = signs.reduce((count, sign, index) => count + (index === 0 || sign !== signs[index - 1] ? 1 : 0), 0)
  const total = positive + negative
  const expectedRuns = total === 0 ? 0 : 2 * positive * negative / total + 1
  if (Math.min(positive, negative) === 0) {
    // One sign only: as unlikely as total tosses of one side.
    return { runs, expectedRuns, pValue: total < 2 ? 1 : 2 ** (1 - total) }
  }
  return { runs, expectedRuns, pValue: Math.max(positive, negative) <= EXACT_UP_TO ? exactRuns(runs, positive, negative) : normalRuns(runs, positive, negative, expectedRuns) }
}

function exactRuns(runs: number, positive: number, negative: number): number {
  let sum = 0
  for (let r = 2; r <= runs; r += 1) {
    const k = Math.floor(r / 2)
    sum += r % 2 === 0
      ? 2 * choose(positive - 1, k - 1) * choose(negative - 1, k - 1)
      : choose(positive - 1, k - 1) * choose(negative - 1, k) + choose(positive - 1, k) * choose(negative - 1, k - 1)
  }
  return Math.min(1, sum / choose(positive + negative, positive))
}

function normalRuns(runs: number, positive: number, negative: number, expected: number): number {
  const total = positive + negative
  const variance = (expected - 1) * (expected - 2) / (total - 1)
  return erfc(-(runs + 0.5 - expected) / Math.sqrt(2 * variance)) / 2
}

function choose(from: number, taken: number): number {
  if (taken < 0 || taken > from) return 0
  let value = 1
  for (let k = 1; k <= taken; k += 1) value *= (from - taken + k) / k
  return value
}

/**
 * Median of numbers.
 *
 * @param values in any order; at least one
 */
export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b)
  const middle = sorted.length >> 1
  return sorted.length % 2 === 1 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2
}

/** Beyond this the residuals are one smooth curve, and the formula has nothing to say. */
const MOST_CORRELATION = 0.9

/**
 * Factor by which standard errors grow when neighbouring residuals resemble each other: with correlation ρ from neighbour to neighbour,
 * n points are worth n(1 − ρ)/(1 + ρ). A correlation that chance explains (ρ ≤ 2/√n) counts as none.
 * Source: G. V. Bayley and J. M. Hammersley, J. R. Stat. Soc. Suppl. 8, 184 (1946) (from memory).
 *
 * @param residuals weighted, in order of temperature
 * @returns 1 or more
 */
export function correlationInflation(residuals: readonly number[]): number {
  const power = residuals.reduce((sum, value) => sum + value * value, 0)
  if (residuals.length < 5 || power === 0) return 1
  const correlation = residuals.slice(1).reduce((sum, value, index) => sum + value * residuals[index]!, 0) / power
  if (correlation <= 2 / Math.sqrt(residuals.length)) return 1
  const bounded = Math.min(correlation, MOST_CORRELATION)
  return Math.sqrt((1 + bounded) / (1 - bounded))
}
