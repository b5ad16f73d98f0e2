import { DomainError } from '#shared/errors'
import { correctedAkaike } from '#shared/heat-capacity/akaike'
import { debyeTemperatureFromBeta3 } from '#shared/heat-capacity/debye'
import { solveLeastSquares } from '#shared/heat-capacity/least-squares'
import { TERM_UNIT, termValue } from '#shared/heat-capacity/terms'
import type { Estimate, FitModel, FitTerm, FitWeights, HeatCapacityCurve, LowTemperatureFit } from '#shared/heat-capacity/types'
import type { WindowPoints } from '#shared/heat-capacity/window'
import { DEFAULT_RELATIVE_SIGMA, pointsInWindow } from '#shared/heat-capacity/window'

/** What a fit needs beside the curve and the model. */
export interface FitOptions {
  /** Atoms per formula unit, r; Θ_D depends on it. */
  readonly atomsPerFormulaUnit: number
  /** `stated-sigma` when the curve states σ, else `relative`. */
  readonly weights?: FitWeights
  /** Share of C taken as σ with relative weights; 0.01 when left out. Sets the scale of χ² only. */
  readonly relativeSigma?: number
  /** `absolute` with stated σ, else `scaled`, since then only the ratios of the errors are known. */
  readonly errorConvention?: 'absolute' | 'scaled'
}

/**
 * Fits C = γT + β₃T³ (+ β₅T⁵) (+ A/T²) (+ a constant) by weighted linear least squares.
 *
 * Weights: 1/σ² of the stated σ, whose standard errors take σ at face value; or, where none is stated, 1/C² (each point as good in
 * per cent), whose standard errors are scaled by √(χ²/ν). C against T with 1/σ² is the same as C/T against T² with (σ/T)⁻²; unweighted
 * they differ.
 *
 * @param curve temperatures in K, heat capacities and σ in mJ/(mol K), all of one length
 * @param model terms, and the window in K, both ends included
 * @param options atoms per formula unit; weights and convention of the standard errors
 * @returns coefficients in mJ/(mol K^(n+1)), covariance in the order of the terms, Θ_D in K where β₃ > 0, χ², ν, condition number, AICc
 * @throws DomainError when the window holds too few points or temperatures, or a point cannot be used
 * @example fitLowTemperature(curve, { terms: ['gamma', 'beta3'], windowK: [1.5, 6] }, { atomsPerFormulaUnit: 1 }).coefficients.gamma
 */
export function fitLowTemperature(curve: HeatCapacityCurve, model: FitModel, options: FitOptions): LowTemperatureFit {
  const { terms } = model
  checkTerms(terms)
  const weights = options.weights ?? (curve.sigma ? 'stated-sigma' : 'relative')
  const errorConvention = options.errorConvention ?? (weights === 'stated-sigma' ? 'absolute' : 'scaled')
  const relativeSigma = weights === 'relative' ? options.relativeSigma ?? DEFAULT_RELATIVE_SIGMA : undefined
  const points = pointsInWindow(curve, model.windowK, weights, relativeSigma)
  checkEnough(points, terms.length, model.windowK)

  const solution = solveLeastSquares({ columns: terms.map(term => columnOf(term, points.temperatureK)), values: points.heatCapacity, sigma: points.sigma })
  const reducedChiSquared = solution.chiSquared / solution.degreesOfFreedom
  const factor = errorConvention === 'scaled' ? reducedChiSquared : 1
  const covariance = solution.absoluteCovariance.map(row => row.map(value => value * factor))
  return describe({
    model,
    weights,
    errorConvention,
    covariance,
    pointCount: points.indices.length,
    degreesOfFreedom: solution.degreesOfFreedom,
    chiSquared: solution.chiSquared,
    reducedChiSquared,
    conditionNumber: solution.conditionNumber,
    aicc: correctedAkaike(solution.chiSquared, points.indices.length, terms.length, errorConvention),
    residuals: Array.from(solution.residuals),
    usedIndices: points.indices,
    relativeSigma,
  }, solution.coefficients, options.atomsPerFormulaUnit)
}

type Bare = Omit<LowTemperatureFit, 'coefficients' | 'debyeTemperature'>

function describe(bare: Bare, values: readonly number[], atomsPerFormulaUnit: number): LowTemperatureFit {
  const coefficients: Partial<Record<FitTerm, Estimate>> = {}
  bare.model.terms.forEach((term, j) => {
    coefficients[term] = { value: values[j]!, standardError: Math.sqrt(bare.covariance[j]![j]!), unit: TERM_UNIT[term] }
  })
  const { beta3 } = coefficients
  return { ...bare, coefficients, debyeTemperature: beta3 && debyeTemperatureFromBeta3(beta3.value, atomsPerFormulaUnit, beta3.standardError) }
}

function checkTerms(terms: readonly FitTerm[]): void {
  if (terms.length === 0) throw new DomainError('invalid', 'The model has no terms. Choose at least γT and β₃T³.', ['terms'])
  if (new Set(terms).size !== terms.length) throw new DomainError('invalid', 'A term stands twice in the model. Name each term once.', ['terms'])
}

/** One point more than coefficients at least: with N = p the line goes through every point and its errors are not 0 but unknown. */
function checkEnough(points: WindowPoints, termCount: number, [low, high]: readonly [number, number]): void {
  const count = points.indices.length
  const place = `between ${low} K and ${high} K`
  if (count === 0) throw new DomainError('invalid', `No points lie ${place}. Move or widen the window.`, ['windowK'])
  if (count <= termCount) {
    throw new DomainError('invalid', `${count === 1 ? 'Only one point lies' : `Only ${count} points lie`} ${place}; ${termCount} coefficients need at least ${termCount + 1}, or their standard errors are undefined. Widen the window or leave out a term.`, ['windowK'])
  }
  if (points.distinctTemperatures < termCount) {
    throw new DomainError('invalid', `The ${count} points ${place} lie at only ${points.distinctTemperatures === 1 ? 'one temperature' : `${points.distinctTemperatures} temperatures`}; ${termCount} coefficients need as many. Widen the window or leave out a term.`, ['windowK'])
  }
}

function columnOf(term: FitTerm, temperatureK: Float64Array): Float64Array {
  const column = new Float64Array(temperatureK.length)
  for (let i = 0; i < column.length; i += 1) column[i] = termValue(term, temperatureK[i]!)
  return column
}

/**
 * Carries the uncertainty of the mass into a fit. A wrong mass moves every point, and so every coefficient, by one factor: it adds
 * in quadrature to each error, correlates the coefficients fully, and leaves χ² and residuals alone. Θ_D takes a third of it.
 *
 * @param fit as fitted
 * @param relativeUncertainty standard uncertainty of the mass over the mass, 0 or more
 * @returns the same fit with larger standard errors and covariance
 * @throws DomainError when it is negative, or was added before
 */
export function withMassUncertainty(fit: LowTemperatureFit, relativeUncertainty: number): LowTemperatureFit {
  if (!(relativeUncertainty >= 0 && Number.isFinite(relativeUncertainty))) throw new DomainError('invalid', 'The uncertainty of the mass must be zero or more. Enter it in the sample sheet.', ['massUncertaintyMg'])
  if (fit.commonRelativeUncertainty !== undefined) throw new DomainError('conflict', 'The uncertainty of the mass is in these errors already. Add it once only.', ['massUncertaintyMg'])
  const values = fit.model.terms.map(term => fit.coefficients[term]!.value)
  const covariance = fit.covariance.map((row, i) => row.map((value, j) => value + relativeUncertainty ** 2 * values[i]! * values[j]!))
  const coefficients = Object.fromEntries(fit.model.terms.map((term, j) => [term, { ...fit.coefficients[term]!, standardError: Math.sqrt(covariance[j]![j]!) }]))
  const theta = fit.debyeTemperature
  return {
    ...fit,
    coefficients,
    covariance,
    debyeTemperature: theta && { ...theta, standardError: Math.hypot(theta.standardError, theta.value * relativeUncertainty / 3) },
    commonRelativeUncertainty: relativeUncertainty,
  }
}
