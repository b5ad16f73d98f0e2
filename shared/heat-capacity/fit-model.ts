import { DomainError } from '#shared/errors'
import { correctedAkaike } from '#shared/heat-capacity/akaike'
import type { FitOptions } from '#shared/heat-capacity/fit'
import { solveLeastSquares } from '#shared/heat-capacity/least-squares'
import type { CurveModel, SeparableModel } from '#shared/heat-capacity/models'
import { separableModel } from '#shared/heat-capacity/models'
import { fitNonlinear } from '#shared/heat-capacity/nonlinear'
import type { Estimate, FitWeights, HeatCapacityCurve } from '#shared/heat-capacity/types'
import type { WindowPoints } from '#shared/heat-capacity/window'
import { DEFAULT_RELATIVE_SIGMA, pointsInWindow } from '#shared/heat-capacity/window'

/** Result of a fit of one of the models of `models.ts`. */
export interface CurveModelFit {
  readonly model: CurveModel
  readonly atomsPerFormulaUnit: number
  readonly weights: FitWeights
  readonly errorConvention: 'absolute' | 'scaled'
  /** By name: `gap`, `degeneracyRatio`, `amount`, `prefactor`, `debyeTemperature`, `einsteinTemperature`, `debyeAtoms`, `einsteinAtoms`, and the terms beside it. */
  readonly parameters: Readonly<Record<string, Estimate>>
  /** Covariance in the order of `parameterNames`. */
  readonly covariance: readonly (readonly number[])[]
  readonly parameterNames: readonly string[]
  readonly pointCount: number
  readonly degreesOfFreedom: number
  readonly chiSquared: number
  readonly reducedChiSquared: number
  readonly conditionNumber: number
  readonly aicc?: number
  /** (data − fit)/σ of the points used. */
  readonly residuals: readonly number[]
  readonly usedIndices: readonly number[]
}

/**
 * Fits a two-level Schottky anomaly, a gapped exponential or a lattice over the whole range by Levenberg–Marquardt. Starts come from
 * a grid of shapes, at each of which the amounts are the linear least squares: no start values have to be guessed.
 *
 * @param curve temperatures in K, heat capacities and σ in mJ/(mol K)
 * @param model which model, window in K, terms beside it
 * @param options atoms per formula unit; weights and convention of the errors as in `fitLowTemperature`
 * @returns parameters with standard errors, covariance, χ², ν, AICc
 * @throws DomainError when there are too few points, one cannot be used, or the points do not hold a parameter (a window far above the gap knows only its tail)
 */
export function fitCurveModel(curve: HeatCapacityCurve, model: CurveModel, options: FitOptions): CurveModelFit {
  checkModel(model, options.atomsPerFormulaUnit)
  const weights = options.weights ?? (curve.sigma ? 'stated-sigma' : 'relative')
  const errorConvention = options.errorConvention ?? (weights === 'stated-sigma' ? 'absolute' : 'scaled')
  const points = pointsInWindow(curve, model.windowK, weights, weights === 'relative' ? options.relativeSigma ?? DEFAULT_RELATIVE_SIGMA : undefined)
  const shape = separableModel(model, options.atomsPerFormulaUnit)
  const all = [...shape.shapes, ...shape.amounts]
  if (points.indices.length <= all.length || points.distinctTemperatures < all.length) {
    throw new DomainError('invalid', `${points.indices.length} points at ${points.distinctTemperatures} temperatures lie in the window; ${all.length} parameters with their errors need at least ${all.length + 1}. Widen the window or take a simpler model.`, ['windowK'])
  }
  const solution = fitNonlinear({
    evaluate: parameters => evaluate(shape, parameters, points.temperatureK),
    values: points.heatCapacity,
    sigma: points.sigma,
    start: findStart(shape, points),
    positive: all.map((_, j) => j < shape.shapes.length),
  })
  const reducedChiSquared = solution.chiSquared / solution.degreesOfFreedom
  const factor = errorConvention === 'scaled' ? reducedChiSquared : 1
  const covariance = solution.absoluteCovariance.map(row => row.map(value => value * factor))
  return {
    model,
    atomsPerFormulaUnit: options.atomsPerFormulaUnit,
    weights,
    errorConvention,
    parameters: Object.fromEntries(all.map(({ name, unit }, j) => [name, { value: solution.coefficients[j]!, standardError: Math.sqrt(covariance[j]![j]!), unit }])),
    covariance,
    parameterNames: all.map(({ name }) => name),
    pointCount: points.indices.length,
    degreesOfFreedom: solution.degreesOfFreedom,
    chiSquared: solution.chiSquared,
    reducedChiSquared,
    conditionNumber: solution.conditionNumber,
    aicc: correctedAkaike(solution.chiSquared, points.indices.length, all.length, errorConvention),
    residuals: Array.from(solution.residuals),
    usedIndices: points.indices,
  }
}

/**
 * The heat capacity of a fitted model.
 *
 * @param fit as fitted
 * @param temperatureK K, each above 0
 * @returns mJ/(mol K)
 */
export function modelHeatCapacity(fit: CurveModelFit, temperatureK: readonly number[]): number[] {
  const parameters = fit.parameterNames.map(name => fit.parameters[name]!.value)
  return Array.from(evaluate(separableModel(fit.model, fit.atomsPerFormulaUnit), parameters, temperatureK))
}

function checkModel({ background = [], degeneracyRatio }: CurveModel, atomsPerFormulaUnit: number): void {
  if (new Set(background).size !== background.length) throw new DomainError('invalid', 'A term stands twice beside the model. Name each term once.', ['background'])
  if (!(atomsPerFormulaUnit > 0)) throw new DomainError('invalid', 'Atoms per formula unit must be above zero. Check the formula of the sample.', ['atomsPerFormulaUnit'])
  if (typeof degeneracyRatio === 'number' && !(degeneracyRatio > 0)) throw new DomainError('invalid', 'The degeneracy ratio must be above zero. Enter for example 1 for two single levels.', ['degeneracyRatio'])
}

function evaluate(model: SeparableModel, parameters: readonly number[], temperatureK: ArrayLike<number>): Float64Array {
  const shapes = parameters.slice(0, model.shapes.length)
  const result = new Float64Array(temperatureK.length)
  for (let i = 0; i < result.length; i += 1) {
    let sum = model.fixed(temperatureK[i]!, shapes)
    for (let j = 0; j < model.functions.length; j += 1) sum += parameters[shapes.length + j]! * model.functions[j]!(temperatureK[i]!, shapes)
    result[i] = sum
  }
  return result
}

/** The grid is searched on at most this many points, spread evenly: it only has to find the right valley. */
const START_POINTS = 120

function findStart(model: SeparableModel, points: WindowPoints): number[] {
  const stride = Math.ceil(points.temperatureK.length / START_POINTS)
  const thin = (source: Float64Array) => source.filter((_, i) => i % stride === 0)
  const [temperatureK, heatCapacity, sigma] = [thin(points.temperatureK), thin(points.heatCapacity), thin(points.sigma)]
  let best: { parameters: number[], chiSquared: number } | undefined
  for (const shapes of combinations(model.shapes.map(shape => shape.grid))) {
    const rest = heatCapacity.map((value, i) => value - model.fixed(temperatureK[i]!, shapes))
    const amounts = amountsFor(model, shapes, temperatureK, rest, sigma)
    if (amounts && (!best || amounts.chiSquared < best.chiSquared)) best = { parameters: [...shapes, ...amounts.coefficients], chiSquared: amounts.chiSquared }
  }
  if (!best) throw new DomainError('invalid', 'These points cannot tell the parts of the model apart. Widen the window or take a simpler model.', ['model'])
  return best.parameters
}

function combinations(grids: readonly (readonly number[])[]): number[][] {
  return grids.reduce<number[][]>((partial, grid) => partial.flatMap(begun => grid.map(value => [...begun, value])), [[]])
}

/** Amounts for given shapes, or undefined where the shapes leave nothing to tell apart (a gap so large that nothing is excited). */
function amountsFor(model: SeparableModel, shapes: readonly number[], temperatureK: Float64Array, values: Float64Array, sigma: Float64Array): { coefficients: readonly number[], chiSquared: number } | undefined {
  if (model.functions.length === 0) return { coefficients: [], chiSquared: values.reduce((sum, value, i) => sum + (value / sigma[i]!) ** 2, 0) }
  if (values.length < model.functions.length) return undefined
  try {
    return solveLeastSquares({ columns: model.functions.map(each => temperatureK.map(t => each(t, shapes))), values, sigma })
  }
  catch (error) {
    if (error instanceof DomainError) return undefined
    throw error
  }
}
