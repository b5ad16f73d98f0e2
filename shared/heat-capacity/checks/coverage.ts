import type { Check } from '#shared/heat-capacity/checks/context'
import { figures, frameOf, percent, usedRangeK } from '#shared/heat-capacity/checks/context'

const frame = frameOf({
  id: 'coverage',
  title: 'Coverage of the window',
  source: 'common practice, no source',
  why: 'γ is where the line of C/T against T² meets T = 0: it takes points close to there.\nFew points, or a gap, leave the line to a handful of them.',
})

/** Enough points, spread over the window, reaching low enough? */
export const coverage: Check = (context) => {
  const { curve, fit, thresholds } = context
  const [coldest, warmest] = usedRangeK(context)
  const squares = fit.usedIndices.map(index => curve.temperatureK[index]! ** 2)
  const gap = squares.slice(1).reduce((widest, square, index) => Math.max(widest, square - squares[index]!), 0) / (warmest ** 2 - coldest ** 2)
  const reach = coldest / warmest
  const number = { value: fit.pointCount, unit: 'points', band: [thresholds.coveragePoints, null] as const }
  const words = `${fit.pointCount} points from ${figures(coldest)} K to ${figures(warmest)} K`
  if (fit.degreesOfFreedom < thresholds.coverageFreedom) return frame.say('fail', `${words} leave ${fit.degreesOfFreedom} degrees of freedom for ${fit.model.terms.length} coefficients: their errors mean little. Widen the window or measure more points.`, number)
  if (reach > thresholds.coverageReachFail) return frame.say('fail', `${words}: the coldest point is ${percent(reach)} of the warmest, so γ is a far extrapolation. Widen the window to the cold.`, number)
  const faults: string[] = []
  if (fit.pointCount < thresholds.coveragePoints) faults.push(`fewer than ${thresholds.coveragePoints}`)
  if (reach > thresholds.coverageReach) faults.push(`the coldest is ${percent(reach)} of the warmest temperature`)
  if (gap > thresholds.coverageGap) faults.push(`one gap takes ${percent(gap)} of the window in T²`)
  if (faults.length > 0) return frame.say('caution', `${words}: ${faults.join('; ')}. Measure more points there.`, number)
  return frame.say('ok', `${words}, the widest gap ${percent(gap)} of the window in T².`, number)
}
