import { Matrix, SingularValueDecomposition } from 'ml-matrix'
import { DomainError } from '#shared/errors'
import { dotResidual, transposedResidual } from '#shared/heat-capacity/compensated'
import type { PivotedQr } from '#shared/heat-capacity/householder'
import { applyQ, applyTransposedQ, factorise, isRankDeficient, solveTransposedTriangle, solveTriangle, triangle } from '#shared/heat-capacity/householder'

/** A linear model y = Σ bⱼ xⱼ with known or unknown errors. All columns have the length of `values`. */
export interface LeastSquaresProblem {
  /** The design matrix, column by column, unweighted. */
  readonly columns: readonly ArrayLike<number>[]
  readonly values: ArrayLike<number>
  /** Standard uncertainty of each value, above zero; all 1 when left out. */
  readonly sigma?: ArrayLike<number>
}

/** The solution, with both conventions of the standard error. */
export interface LeastSquaresSolution {
  readonly coefficients: readonly number[]
  /** σ taken at face value: √ of the diagonal of (XᵀWX)⁻¹. */
  readonly absoluteStandardErrors: readonly number[]
  /** The absolute ones times √(χ²/ν); undefined when there are as many coefficients as points: then nothing is known of them. */
  readonly scaledStandardErrors?: readonly number[]
  /** (XᵀWX)⁻¹, in the order of the columns. */
  readonly absoluteCovariance: readonly (readonly number[])[]
  /** (value − fit)/σ. */
  readonly residuals: Float64Array
  readonly chiSquared: number
  readonly degreesOfFreedom: number
  /** Condition number (2-norm) of the weighted matrix with columns of unit length. */
  readonly conditionNumber: number
}

/** Above this condition number the solution is refined; below it plain QR loses no more than about a digit. */
const REFINE_ABOVE = 10
const REFINEMENT_STEPS = 4

/**
 * Weighted linear least squares by Householder QR with pivoting on scaled columns, never by normal equations (which keep no digit
 * of NIST's Filip). Ill-conditioned problems are refined with residuals in doubled precision.
 * Source: G. H. Golub and C. F. Van Loan, Matrix Computations, 3rd ed., 5.3 and 5.5; Å. Björck, BIT 7, 257 (1967) for the refinement.
 *
 * @param problem design matrix, values and their standard uncertainties
 * @returns coefficients, standard errors of both conventions, covariance, residuals, χ², ν and condition number
 * @throws DomainError when lengths differ, a number is not finite, a σ is not above zero, there are fewer points than coefficients,
 *   or the points cannot tell two terms apart
 * @example solveLeastSquares({ columns: [[1, 1, 1], [0, 1, 2]], values: [1, 3, 5] }).coefficients // [1, 2]
 */
export function solveLeastSquares(problem: LeastSquaresProblem): LeastSquaresSolution {
  checkProblem(problem)
  const rows = problem.values.length
  const size = problem.columns.length
  const { scaled, scales, values } = weighAndScale(problem)
  const qr = factorise(scaled.map(column => column.slice()))
  if (isRankDeficient(qr)) {
    throw new DomainError('invalid', 'These points cannot tell the terms of the model apart. Widen the window or leave out a term.', ['terms'])
  }
  const projected = values.slice()
  applyTransposedQ(qr, projected)
  const solution = unpivot(qr, solveTriangle(qr, projected))
  projected.fill(0, 0, size)
  applyQ(qr, projected)
  const residuals = projected
  const conditionNumber = conditionOf(qr)
  if (conditionNumber > REFINE_ABOVE) refine(qr, scaled, values, solution, residuals)
  let chiSquared = 0
  for (let i = 0; i < rows; i += 1) chiSquared += residuals[i]! * residuals[i]!
  const degreesOfFreedom = rows - size
  const absoluteCovariance = covarianceOf(qr, scales)
  const absoluteStandardErrors = absoluteCovariance.map((row, j) => Math.sqrt(row[j]!))
  const inflation = degreesOfFreedom > 0 ? Math.sqrt(chiSquared / degreesOfFreedom) : undefined
  return {
    coefficients: Array.from(solution, (value, j) => value / scales[j]!),
    absoluteStandardErrors,
    scaledStandardErrors: inflation === undefined ? undefined : absoluteStandardErrors.map(error => error * inflation),
    absoluteCovariance,
    residuals,
    chiSquared,
    degreesOfFreedom,
    conditionNumber,
  }
}

function checkProblem({ columns, values, sigma }: LeastSquaresProblem): void {
  const rows = values.length
  if (columns.length === 0) throw new DomainError('invalid', 'The model has no terms. Choose at least one.', ['terms'])
  if (columns.some(column => column.length !== rows) || (sigma && sigma.length !== rows)) {
    throw new DomainError('invalid', 'Temperatures, heat capacities and uncertainties must be equally many. Check the columns of the table.', ['curve'])
  }
  if (rows < columns.length) {
    throw new DomainError('invalid', `${rows} points cannot settle ${columns.length} coefficients. Widen the window or leave out a term.`, ['windowK'])
  }
  for (let i = 0; i < rows; i += 1) {
    if (!Number.isFinite(values[i]) || columns.some(column => !Number.isFinite(column[i]))) {
      throw new DomainError('invalid', `Point ${i + 1} of the fit is no finite number. Leave it out or mend it.`, ['curve', i])
    }
    if (sigma && !(sigma[i]! > 0 && Number.isFinite(sigma[i]))) {
      throw new DomainError('invalid', `Point ${i + 1} of the fit has an uncertainty that is not above zero. State its uncertainty or leave it out.`, ['curve', i])
    }
  }
}

/**
 * Divides rows by σ and brings columns to about unit length. The scales are powers of two, so that scaling rounds nothing.
 */
function weighAndScale({ columns, values, sigma }: LeastSquaresProblem): { scaled: Float64Array[], scales: number[], values: Float64Array } {
  const weighted = weigh(values, sigma)
  const scales: number[] = []
  const scaled = columns.map((source) => {
    const column = weigh(source, sigma)
    // The largest entry first keeps the sum of squares from overflowing.
    let largest = 0
    for (let i = 0; i < column.length; i += 1) largest = Math.max(largest, Math.abs(column[i]!))
    if (largest === 0) {
      scales.push(1)
      return column
    }
    let sum = 0
    for (let i = 0; i < column.length; i += 1) sum += (column[i]! / largest) ** 2
    const scale = 2 ** Math.round(Math.log2(largest * Math.sqrt(sum)))
    scales.push(scale)
    for (let i = 0; i < column.length; i += 1) column[i]! /= scale
    return column
  })
  return { scaled, scales, values: weighted }
}

/** Plain loops: `Float64Array.from` with a function is several times slower, and this runs on every move of the window. */
function weigh(source: ArrayLike<number>, sigma: ArrayLike<number> | undefined): Float64Array {
  const column = new Float64Array(source.length)
  if (sigma) for (let i = 0; i < column.length; i += 1) column[i] = source[i]! / sigma[i]!
  else column.set(source)
  return column
}

function unpivot(qr: PivotedQr, pivoted: Float64Array): Float64Array {
  const plain = new Float64Array(qr.size)
  qr.pivots.forEach((column, place) => {
    plain[column] = pivoted[place]!
  })
  return plain
}

/** Improves x and r of the augmented system [I A; Aᵀ 0][r; x] = [b; 0], with residuals computed in doubled precision. */
function refine(qr: PivotedQr, columns: readonly Float64Array[], values: Float64Array, solution: Float64Array, residuals: Float64Array): void {
  let previous = Infinity
  for (let step = 0; step < REFINEMENT_STEPS; step += 1) {
    const upper = dotResidual(columns, values, solution, residuals)
    const lower = transposedResidual(columns, residuals)
    applyTransposedQ(qr, upper)
    const inner = solveTransposedTriangle(qr, qr.pivots.map(column => lower[column]!))
    const change = unpivot(qr, solveTriangle(qr, Array.from(inner, (value, k) => upper[k]! - value)))
    upper.set(inner)
    applyQ(qr, upper)
    const size = largestShare(change, solution)
    // It no longer contracts: rounding has been reached, and another step would only stir it.
    if (!(size < previous / 2)) break
    previous = size
    for (let j = 0; j < solution.length; j += 1) solution[j]! += change[j]!
    for (let i = 0; i < residuals.length; i += 1) residuals[i]! += upper[i]!
  }
}

function largestShare(change: Float64Array, solution: Float64Array): number {
  let largest = 0
  for (let j = 0; j < change.length; j += 1) if (change[j] !== 0) largest = Math.max(largest, Math.abs(change[j]! / (solution[j]! || 1)))
  return largest
}

/** (RᵀR)⁻¹ row by row, back in the order and the units of the columns given. */
function covarianceOf(qr: PivotedQr, scales: readonly number[]): number[][] {
  const { size } = qr
  const inverse = Array.from({ length: size }, (_, j) => solveTriangle(qr, Array.from({ length: size }, (__, i) => i === j ? 1 : 0)))
  const covariance = Array.from({ length: size }, () => new Array<number>(size).fill(0))
  for (let i = 0; i < size; i += 1) {
    for (let j = 0; j < size; j += 1) {
      let sum = 0
      for (let k = Math.max(i, j); k < size; k += 1) sum += inverse[k]![i]! * inverse[k]![j]!
      const [row, column] = [qr.pivots[i]!, qr.pivots[j]!]
      covariance[row]![column] = sum / (scales[row]! * scales[column]!)
    }
  }
  return covariance
}

/** Ratio of the largest to the smallest singular value of R with columns brought to exactly unit length. */
function conditionOf(qr: PivotedQr): number {
  const rows = triangle(qr)
  const lengths = rows.map((_, j) => Math.hypot(...rows.map(row => row[j]!)))
  const values = new SingularValueDecomposition(new Matrix(rows.map(row => row.map((value, j) => value / lengths[j]!))), { computeLeftSingularVectors: false, computeRightSingularVectors: false }).diagonal
  return values[0]! / values[values.length - 1]!
}
