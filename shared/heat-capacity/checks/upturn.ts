import type { Check, CheckContext } from '#shared/heat-capacity/checks/context'
import { carefulError, figures, frameOf, percent, refitIfPossible, usedRangeK } from '#shared/heat-capacity/checks/context'
import { profileOf } from '#shared/heat-capacity/checks/profile'
import type { Estimate } from '#shared/heat-capacity/types'
import { formatUncertainty } from '#shared/utils/format-uncertainty'

const frame = frameOf({
  id: 'upturn',
  title: 'Upturn at the cold end',
  source: 'High-temperature tail A/T² of a Schottky anomaly: E. S. R. Gopal, Specific Heats at Low Temperatures, ch. 5 (from memory); size of a rise: common practice',
  why: 'Nuclear or magnetic levels make C/T rise again towards T = 0.\nA plain fit then gives a γ that is wrong by any amount, with a good-looking error.',
})

interface Rise { readonly share: number, readonly distance: number, readonly lowestAtK: number }

/** Does C/T turn up at the cold end, and does the model allow for it? */
export const upturn: Check = (context) => {
  const { fit, thresholds } = context
  const rise = riseOf(context)
  if (!rise) return frame.skip('There are too few points to look for an upturn.')
  const number = { value: rise.share, unit: '', band: [null, thresholds.upturnRise] as const }
  const turnsUp = rise.share > thresholds.upturnRise && rise.distance > thresholds.upturnStandardErrors
  const words = `C/T turns up below ${figures(rise.lowestAtK)} K, by ${percent(rise.share)} at the coldest points`
  const tail = fit.coefficients.tail
  if (tail) return withTail(context, tail, turnsUp ? words : undefined, number)
  if (turnsUp) return frame.say('fail', `${words}, and the model has no term for it: γ of this fit means nothing. Add the A/T² tail, or raise the cold edge of the window above ${figures(rise.lowestAtK)} K.`, number)
  const hidden = hiddenTail(context)
  if (hidden) return frame.say('caution', `C/T shows no upturn, but a tail A/T² would make up ${percent(hidden)} of C at the cold end. Try the fit with it.`, number)
  return frame.say('ok', 'C/T does not turn up at the cold end.', number)
}

function withTail(context: CheckContext, tail: Estimate, words: string | undefined, number: { value: number, unit: string, band: readonly [null, number] }) {
  const { fit, thresholds } = context
  const error = carefulError(fit, 'tail')
  const amount = `A = ${formatUncertainty(tail.value, error).compact} ${tail.unit}`
  if (tail.value < -3 * error) return frame.say('fail', `The tail comes out negative, ${amount}, which no level scheme gives. Leave it out or check the window.`, number)
  if (!words) return frame.say('ok', `C/T does not turn up at the cold end; the tail takes ${amount}.`, number)
  const left = Math.abs(coldMisfit(context))
  if (tail.value < 3 * error) return frame.say('fail', `${words}, but the tail term does not take it up (${amount}).`, number)
  if (left > thresholds.upturnLeft) return frame.say('caution', `${words}; the tail term takes it up with ${amount} but leaves ${percent(left)} of C at the coldest points. The gap may be near: try a Schottky model.`, number)
  return frame.say('ok', `${words}, and the tail term takes it up: ${amount}.`, number)
}

/** Rise of C/T from its minimum to the coldest points, over the whole curve from the cold edge of the window on. */
function riseOf(context: CheckContext): Rise | undefined {
  const { curve } = context
  const bins = profileOf(curve, [usedRangeK(context)[0], curve.temperatureK[curve.temperatureK.length - 1]!])
  if (bins.length < 5) return undefined
  const width = bins.length >= 15 ? 3 : bins.length >= 9 ? 2 : 1
  const meanOf = (from: number) => {
    const part = bins.slice(from, from + width)
    return { ratio: part.reduce((sum, bin) => sum + bin.ratio, 0) / part.length, error: Math.hypot(...part.map(bin => bin.standardError)) / part.length, at: part[0]!.temperatureK }
  }
  const means = Array.from({ length: bins.length - width + 1 }, (_, from) => meanOf(from))
  const cold = means[0]!
  const lowest = means.reduce((best, mean) => mean.ratio < best.ratio ? mean : best)
  const error = Math.hypot(cold.error, lowest.error)
  const difference = cold.ratio - lowest.ratio
  return { share: lowest.ratio > 0 ? difference / lowest.ratio : difference > 0 ? Infinity : 0, distance: error > 0 ? difference / error : difference > 0 ? Infinity : 0, lowestAtK: lowest.at }
}

/** Mean relative misfit of the coldest tenth of the points, at least two. */
function coldMisfit({ curve, fit }: CheckContext): number {
  const count = Math.max(2, Math.ceil(fit.usedIndices.length / 10))
  const shares = fit.usedIndices.slice(0, count).map((index, place) => {
    const value = curve.heatCapacity[index]!
    const sigma = fit.weights === 'stated-sigma' ? curve.sigma![index]! : fit.weights === 'uniform' ? 1 : (fit.relativeSigma ?? 0.01) * value
    return fit.residuals[place]! * sigma / value
  })
  return shares.reduce((sum, share) => sum + share, 0) / shares.length
}

/** Share of C at the cold end that a tail would take, when it stands out of its error; undefined when it does not. */
function hiddenTail(context: CheckContext): number | undefined {
  const { fit, curve, thresholds } = context
  const wider = refitIfPossible(context, [...fit.model.terms, 'tail'])
  const tail = wider?.coefficients.tail
  if (!wider || !tail || tail.value < thresholds.upturnStandardErrors * carefulError(wider, 'tail')) return undefined
  const index = fit.usedIndices[0]!
  const share = tail.value / curve.temperatureK[index]! ** 2 / curve.heatCapacity[index]!
  return share > thresholds.upturnRise ? share : undefined
}
