import { DomainError } from '#shared/errors'
import { applyTransposedQ, factorise, solveTriangle } from '#shared/heat-capacity/householder'
import type { LeastSquaresSolution } from '#shared/heat-capacity/least-squares'
import { solveLeastSquares } from '#shared/heat-capacity/least-squares'

/** A model that is not linear in its parameters, with the points it is fitted to. */
export interface NonlinearProblem {
  /** The model at every point, for one set of parameters. */
  readonly evaluate: (parameters: readonly number[]) => ArrayLike<number>
  readonly values: ArrayLike<number>
  /** Standard uncertainty of each value, above zero; all 1 when left out. */
  readonly sigma?: ArrayLike<number>
  readonly start: readonly number[]
  /** Parameters that can only be above zero (a gap, an amount); they are stepped in their logarithm. */
  readonly positive?: readonly boolean[]
  /** First dampings to try; the fit with the lowest χ² of them is taken. */
  readonly dampings?: readonly number[]
  readonly maximumSteps?: number
}

/** The solution; `coefficients` are the parameters in the order of `start`. */
export interface NonlinearSolution extends LeastSquaresSolution {
  readonly steps: number
}

/** A weak start converges from one damping and not from another (BoxBOD of NIST from its far start): three are cheap. */
const DAMPINGS = [1e-3, 1, 1e3]
const MAXIMUM_STEPS = 500
/** A step this small, relative to each parameter, is the end. */
const STEP_TOLERANCE = 1e-12
/** Step of the central differences, the cube root of the machine precision. */
const DIFFERENCE = Math.cbrt(Number.EPSILON)

interface Descent { internal: Float64Array, chiSquared: number, steps: number, settled: boolean }

/**
 * Weighted nonlinear least squares by Levenberg–Marquardt: each step by QR of the stacked Jacobian and damping, Moré's scaling,
 * Nielsen's damping; standard errors from the Jacobian at the solution.
 *
 * Own code, because ml-levenberg-marquardt 5.1.0 gives no covariance, takes weights shorter than the data without a word, works on
 * normal equations, and from NIST's far starts ends elsewhere in MGH09 and Hahn1 and breaks in BoxBOD (seen with three dampings).
 * Source: J. J. Moré, Lect. Notes Math. 630, 105 (1978); H. B. Nielsen, report IMM-REP-1999-05, Technical University of Denmark (1999).
 *
 * @param problem model, values, uncertainties and start
 * @returns parameters, covariance, standard errors of both conventions, residuals, χ², ν
 * @throws DomainError when the data cannot be used, the model is not finite at the start, the fit does not settle, or a parameter has no hold in the data
 */
export function fitNonlinear(problem: NonlinearProblem): NonlinearSolution {
  const run = prepare(problem)
  let best: Descent | undefined
  for (const damping of problem.dampings ?? DAMPINGS) {
    const found = descend(run, damping, problem.maximumSteps ?? MAXIMUM_STEPS)
    if (!best || (found.settled && !best.settled) || (found.settled === best.settled && found.chiSquared < best.chiSquared)) best = found
  }
  if (!best?.settled) throw new DomainError('invalid', 'The fit did not settle. Start from other values, take a simpler model, or change the window.', ['model'])
  const parameters = run.toParameters(best.internal)
  const model = run.evaluate(best.internal)
  const linear = solveLeastSquares({
    columns: jacobian(run, best.internal).map((column, j) => run.positive[j] ? column.map(value => value / parameters[j]!) : column),
    values: Float64Array.from(run.weighted, (value, i) => value - model[i]!),
  })
  return {
    ...linear,
    coefficients: parameters,
    residuals: Float64Array.from(run.weighted, (value, i) => value - model[i]!),
    chiSquared: best.chiSquared,
    scaledStandardErrors: linear.degreesOfFreedom > 0 ? linear.absoluteStandardErrors.map(error => error * Math.sqrt(best.chiSquared / linear.degreesOfFreedom)) : undefined,
    steps: best.steps,
  }
}

/** The problem in weighted values and internal parameters (logarithms where they must be positive). */
interface Run {
  readonly weighted: Float64Array
  readonly positive: readonly boolean[]
  readonly start: Float64Array
  /** Size below which a parameter is taken as near zero, for the difference steps. */
  readonly typical: Float64Array
  readonly toParameters: (internal: Float64Array) => number[]
  /** Weighted model values. */
  readonly evaluate: (internal: Float64Array) => Float64Array
}

function prepare({ evaluate, values, sigma, start, positive = [] }: NonlinearProblem): Run {
  const rows = values.length
  if (start.length === 0) throw new DomainError('invalid', 'The model has no parameters. Choose another.', ['model'])
  if (sigma && sigma.length !== rows) throw new DomainError('invalid', 'Heat capacities and uncertainties must be equally many. Check the columns of the table.', ['curve'])
  if (rows <= start.length) {
    throw new DomainError('invalid', `${rows} points cannot settle ${start.length} parameters with their errors; ${start.length + 1} are needed. Widen the window or take a simpler model.`, ['windowK'])
  }
  for (let i = 0; i < rows; i += 1) {
    if (!Number.isFinite(values[i])) throw new DomainError('invalid', `Point ${i + 1} of the fit is no finite number. Leave it out or mend it.`, ['curve', i])
    if (sigma && !(sigma[i]! > 0 && Number.isFinite(sigma[i]))) throw new DomainError('invalid', `Point ${i + 1} of the fit has an uncertainty that is not above zero. State its uncertainty or leave it out.`, ['curve', i])
  }
  start.forEach((value, j) => {
    if (!Number.isFinite(value) || (positive[j] && !(value > 0))) throw new DomainError('invalid', `Start value ${j + 1} of the fit must be ${positive[j] ? 'above zero' : 'a number'}. Enter it anew.`, ['start', j])
  })
  const toParameters = (internal: Float64Array) => Array.from(internal, (value, j) => positive[j] ? Math.exp(value) : value)
  const weigh = (source: ArrayLike<number>) => Float64Array.from(source, (value, i) => sigma ? value / sigma[i]! : value)
  const run: Run = {
    weighted: weigh(values),
    positive,
    start: Float64Array.from(start, (value, j) => positive[j] ? Math.log(value) : value),
    typical: Float64Array.from(start, (value, j) => positive[j] ? 1 : Math.abs(value) * 1e-3),
    toParameters,
    evaluate: internal => weigh(evaluate(toParameters(internal))),
  }
  if (!run.evaluate(run.start).every(Number.isFinite)) throw new DomainError('invalid', 'The model has no value at its start. Start from other values.', ['start'])
  return run
}

/** Central differences with respect to the internal parameters, one column each. */
function jacobian(run: Run, internal: Float64Array): Float64Array[] {
  return Array.from(internal, (value, j) => {
    const step = DIFFERENCE * (run.positive[j] ? 1 : Math.max(Math.abs(value), run.typical[j]!) || 1)
    const shifted = internal.slice()
    shifted[j] = value + step
    const above = shifted[j]!
    const high = run.evaluate(shifted)
    shifted[j] = value - step
    const low = run.evaluate(shifted)
    const width = above - shifted[j]!
    for (let i = 0; i < high.length; i += 1) high[i] = (high[i]! - low[i]!) / width
    return high
  })
}

function sumOfSquares(vector: Float64Array): number {
  let sum = 0
  for (let i = 0; i < vector.length; i += 1) sum += vector[i]! * vector[i]!
  return sum
}

function difference(a: Float64Array, b: Float64Array): Float64Array {
  const result = new Float64Array(a.length)
  for (let i = 0; i < a.length; i += 1) result[i] = a[i]! - b[i]!
  return result
}

function descend(run: Run, firstDamping: number, maximumSteps: number): Descent {
  let internal = run.start.slice()
  let residual = difference(run.weighted, run.evaluate(internal))
  let chiSquared = sumOfSquares(residual)
  let columns = jacobian(run, internal)
  const scale = new Float64Array(internal.length)
  let damping = firstDamping
  let growth = 2
  for (let steps = 1; steps <= maximumSteps; steps += 1) {
    if (!columns.every(column => column.every(Number.isFinite))) break
    columns.forEach((column, j) => {
      scale[j] = Math.max(scale[j]!, Math.sqrt(sumOfSquares(column)))
    })
    const { step, predicted } = dampedStep(columns, residual, scale, damping)
    const trial = internal.map((value, j) => value + step[j]!)
    const small = step.every((value, j) => Math.abs(value) <= STEP_TOLERANCE * (run.positive[j] ? 1 : Math.abs(trial[j]!) + Number.MIN_VALUE))
    const trialResidual = difference(run.weighted, run.evaluate(trial))
    const trialChiSquared = sumOfSquares(trialResidual)
    const gain = (chiSquared - trialChiSquared) / predicted
    if (trialChiSquared <= chiSquared && gain > 0) {
      internal = trial
      residual = trialResidual
      chiSquared = trialChiSquared
      columns = jacobian(run, internal)
      damping *= Math.max(1 / 3, 1 - (2 * gain - 1) ** 3)
      growth = 2
      if (small || chiSquared === 0) return { internal, chiSquared, steps, settled: true }
    }
    else {
      // A step lost in rounding, at low or at high damping, means that χ² can fall no further.
      if (small || predicted <= chiSquared * Number.EPSILON) return { internal, chiSquared, steps, settled: true }
      damping *= growth
      growth *= 2
    }
  }
  return { internal, chiSquared, steps: maximumSteps, settled: false }
}

/** Minimises |J d − r|² + λ|D d|², and says by how much χ² should fall. */
function dampedStep(columns: readonly Float64Array[], residual: Float64Array, scale: Float64Array, damping: number): { step: Float64Array, predicted: number } {
  const rows = residual.length
  const size = columns.length
  const root = Math.sqrt(damping)
  const scaleOf = (j: number) => scale[j]! || 1
  // Stepping in D d makes all columns of like size, so the triangle is sound whatever the units of the parameters are.
  const stacked = columns.map((column, j) => {
    const tall = new Float64Array(rows + size)
    for (let i = 0; i < rows; i += 1) tall[i] = column[i]! / scaleOf(j)
    tall[rows + j] = root
    return tall
  })
  const target = new Float64Array(rows + size)
  target.set(residual)
  const qr = factorise(stacked)
  applyTransposedQ(qr, target)
  const pivoted = solveTriangle(qr, target)
  const step = new Float64Array(size)
  let reduction = 0
  qr.pivots.forEach((column, place) => {
    step[column] = pivoted[place]! / scaleOf(column)
    reduction += target[place]! ** 2 + damping * pivoted[place]! ** 2
  })
  return { step, predicted: reduction }
}
