/**
 * Corrected Akaike criterion of a least-squares fit; of two models of the same points and weights the lower one is the better
 * bet, by 2 or more clearly. With known errors the likelihood is χ² itself, otherwise the scale of the errors is one more
 * parameter that was fitted.
 * Source: K. P. Burnham and D. R. Anderson, Model Selection and Multimodel Inference, 2nd ed. (2002), 2.4 and 2.5.
 *
 * @param chiSquared weighted sum of squares
 * @param pointCount N
 * @param coefficientCount p
 * @param errorConvention `absolute` for known errors, `scaled` when only their ratios are known
 * @returns the criterion, or undefined when there are too few points for the correction or the fit is exact
 */
export function correctedAkaike(chiSquared: number, pointCount: number, coefficientCount: number, errorConvention: 'absolute' | 'scaled'): number | undefined {
  const count = errorConvention === 'absolute' ? coefficientCount : coefficientCount + 1
  const spare = pointCount - count - 1
  if (spare <= 0) return undefined
  const penalty = 2 * count + 2 * count * (count + 1) / spare
  if (errorConvention === 'absolute') return chiSquared + penalty
  return chiSquared > 0 ? pointCount * Math.log(chiSquared / pointCount) + penalty : undefined
}
