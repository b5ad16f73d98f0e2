import type { Check } from '#shared/heat-capacity/checks/context'
import { figures, frameOf, usedRangeK } from '#shared/heat-capacity/checks/context'

const frame = frameOf({
  id: 'debye-range',
  title: 'Θ_D and the range of the T³ law',
  source: 'Span of Θ_D from caesium (38 K) to diamond (2230 K), and T ≤ Θ_D/50: C. Kittel, Introduction to Solid State Physics, ch. 5 (from memory)',
  why: 'Θ_D outside the span of solids means a wrong unit, mass or formula.\nToo warm a window bends the lattice term and shifts γ with it.',
})

/** Is Θ_D that of a solid, and does the window keep to the range of the T³ law? */
export const debyeRange: Check = (context) => {
  const { fit, thresholds } = context
  if (!fit.model.terms.includes('beta3')) return frame.skip('The model has no β₃T³ term.')
  const theta = fit.debyeTemperature?.value
  const number = { value: theta, unit: 'K', band: [thresholds.debyeLowK, thresholds.debyeHighK] as const }
  if (theta === undefined) return frame.say('fail', 'β₃ is not above zero, so there is no Θ_D. An upturn, a transition or a wrong window does this.', number)
  const warmest = usedRangeK(context)[1]
  const words = `Θ_D = ${figures(theta, 4)} K`
  if (theta < thresholds.debyeLowK || theta > thresholds.debyeHighK) {
    return frame.say('fail', `${words} is no value of a solid (${thresholds.debyeLowK} K to ${thresholds.debyeHighK} K). Check unit, mass and atoms per formula unit (${figures(context.sample.atomsPerFormulaUnit, 4)}).`, number)
  }
  const divisor = fit.model.terms.includes('beta5') ? thresholds.debyeDivisorBeta5 : thresholds.debyeDivisor
  const range = `the warmest point, ${figures(warmest)} K, is Θ_D/${figures(theta / warmest)}`
  if (warmest > theta / thresholds.debyeDivisorFail) return frame.say('fail', `${words}, but ${range}, far beyond the T³ law. Lower the warm edge of the window under ${figures(theta / divisor)} K.`, number)
  if (warmest > theta / divisor) return frame.say('caution', `${words}; ${range}, warmer than Θ_D/${divisor} = ${figures(theta / divisor)} K. Lower the warm edge, or add β₅T⁵.`, number)
  return frame.say('ok', `${words}, and ${range}, within the T³ law.`, number)
}
