import type { Check, CheckContext } from '#shared/heat-capacity/checks/context'
import { figures, frameOf, percent } from '#shared/heat-capacity/checks/context'
import { runsTest } from '#shared/heat-capacity/statistics'
import { coverageFactor } from '#shared/heat-capacity/student'
import { termValue } from '#shared/heat-capacity/terms'

const frame = frameOf({
  id: 'residuals',
  title: 'Residuals',
  source: 'Runs test: A. Wald and J. Wolfowitz, Ann. Math. Stat. 11, 147 (1940); outliers: studentised residuals, R. D. Cook and S. Weisberg, Residuals and Influence in Regression, 2.2; levels: common practice',
  why: 'Points should scatter about the fit without a pattern and by as much as their errors say.\nA pattern is a missing term; one far point can carry γ by itself.',
})

/** Runs test with p-value, χ²/ν, and outliers by leverage. */
export const residuals: Check = (context) => {
  const { fit, thresholds } = context
  if (fit.degreesOfFreedom < thresholds.coverageFreedom) return frame.skip('There are too few points over the coefficients to judge residuals.')
  const { pValue, runs, expectedRuns } = runsTest(fit.residuals)
  const misfit = relativeMisfit(context)
  const stated = fit.weights === 'stated-sigma'
  const faults: { worth: 'caution' | 'fail', words: string }[] = []
  if (stated && fit.reducedChiSquared > thresholds.residualsChiFail) faults.push({ worth: 'fail', words: `χ²/ν = ${figures(fit.reducedChiSquared)}: the model does not describe the points within their errors` })
  else if (stated && fit.reducedChiSquared > thresholds.residualsChiCaution) faults.push({ worth: 'caution', words: `χ²/ν = ${figures(fit.reducedChiSquared)}: the stated errors are too small or a term is missing` })
  else if (stated && fit.reducedChiSquared < thresholds.residualsChiLow) faults.push({ worth: 'caution', words: `χ²/ν = ${figures(fit.reducedChiSquared)}: the stated errors are too large` })
  const bent = pValue < thresholds.residualsRunsP
  if (bent) {
    const words = `${runs} runs where ${figures(expectedRuns)} are expected (p = ${figures(pValue, 2)}): the points bend away from the model`
    faults.push(misfit > thresholds.residualsMisfit ? { worth: 'fail', words: `${words}, by ${percent(misfit)} on the mean` } : { worth: 'caution', words })
  }
  const outliers = outliersOf(context)
  if (outliers.length > 0) faults.push({ worth: 'caution', words: `${outliers.length === 1 ? 'one point stands' : `${outliers.length} points stand`} far out: ${outliers.slice(0, 3).map(each => placeOf(context, each)).join(', ')}` })
  const number = stated
    ? { value: fit.reducedChiSquared, unit: 'χ²/ν', band: [thresholds.residualsChiLow, thresholds.residualsChiCaution] as const }
    : { value: pValue, unit: 'p of the runs test', band: [thresholds.residualsRunsP, null] as const }
  if (faults.length === 0) {
    return frame.say('ok', `${runs} runs where ${figures(expectedRuns)} are expected (p = ${figures(pValue, 2)})${stated ? `, χ²/ν = ${figures(fit.reducedChiSquared)}` : `; points lie ${percent(misfit)} from the fit on the mean`}.`, number)
  }
  const sentence = faults.map(fault => fault.words).join('; ')
  return frame.say(faults.some(fault => fault.worth === 'fail') ? 'fail' : 'caution', `${sentence[0]!.toUpperCase()}${sentence.slice(1)}.`, number)
}

function sigmaAt({ curve, fit }: CheckContext, index: number): number {
  if (fit.weights === 'stated-sigma') return curve.sigma![index]!
  return fit.weights === 'uniform' ? 1 : (fit.relativeSigma ?? 0.01) * curve.heatCapacity[index]!
}

/** Root mean square of (data − fit)/data. */
function relativeMisfit(context: CheckContext): number {
  const { fit, curve } = context
  const sum = fit.usedIndices.reduce((total, index, place) => total + (fit.residuals[place]! * sigmaAt(context, index) / curve.heatCapacity[index]!) ** 2, 0)
  return Math.sqrt(sum / fit.usedIndices.length)
}

/** Places in the fit of points whose externally studentised residual is too large for so many points, the farthest first. */
function outliersOf(context: CheckContext): number[] {
  const { fit, curve } = context
  const freedom = fit.degreesOfFreedom
  const scale = fit.errorConvention === 'scaled' ? fit.reducedChiSquared : 1
  // Against rounding alone nothing stands out.
  if (freedom < 4 || !(fit.chiSquared > 1e-18)) return []
  // A chance of 1 % that any of all points lies so far out (Bonferroni).
  const limit = coverageFactor(1 - 0.01 / fit.pointCount, freedom - 1)
  const found: { place: number, distance: number }[] = []
  fit.usedIndices.forEach((index, place) => {
    const row = fit.model.terms.map(term => termValue(term, curve.temperatureK[index]!) / sigmaAt(context, index))
    const leverage = row.reduce((sum, left, i) => sum + left * row.reduce((inner, right, j) => inner + fit.covariance[i]![j]! * right, 0), 0) / scale
    const squared = fit.residuals[place]! ** 2 / Math.max(1e-12, 1 - leverage) / fit.reducedChiSquared
    const distance = squared >= freedom ? Infinity : Math.sqrt(squared * (freedom - 1) / (freedom - squared))
    if (distance > limit) found.push({ place, distance })
  })
  return found.sort((a, b) => b.distance - a.distance).map(each => each.place)
}

function placeOf({ curve, fit }: CheckContext, place: number): string {
  const index = fit.usedIndices[place]!
  const row = curve.rowNumbers?.[index]
  return `${figures(curve.temperatureK[index]!, 4)} K${row === undefined ? '' : ` (row ${row})`}`
}
