import type { Check, CheckContext } from '#shared/heat-capacity/checks/context'
import { figures, frameOf, percent, usedRangeK } from '#shared/heat-capacity/checks/context'
import { handbookCurve } from '#shared/heat-capacity/checks/scale'
import type { Estimate } from '#shared/heat-capacity/types'
import { formatUncertainty } from '#shared/utils/format-uncertainty'

const frame = frameOf({
  id: 'handbook',
  title: 'Handbook values',
  source: 'handbook of elements and simple insulators in this program',
  why: 'An element that has been measured many times has no new γ or Θ_D.\nA difference is a slip of unit, mass or formula, or an unfit window.',
})

type Worth = 'ok' | 'caution' | 'fail'

interface Judged { readonly worth: Worth, readonly words: string, readonly value: number, readonly unit: string, readonly band: readonly [number, number] }

/** For a known element: γ and Θ_D against the handbook band. */
export const handbook: Check = (context) => {
  const { handbook: entry, reported } = context
  if (!entry) return frame.skip('The handbook here does not have this material.')
  const judged: Judged[] = []
  const gamma = reported.coefficients.gamma
  const belowTc = entry.criticalTemperatureK !== undefined && usedRangeK(context)[0] < entry.criticalTemperatureK
  if (gamma && entry.kind === 'metal' && !belowTc) judged.push(judge(context, 'γ', gamma, entry.gammaRange))
  if (reported.debyeTemperature) judged.push(judge(context, 'Θ_D', reported.debyeTemperature, entry.debyeTemperatureRangeK))
  const rank: readonly Worth[] = ['ok', 'caution', 'fail']
  const [worst] = judged.sort((a, b) => rank.indexOf(b.worth) - rank.indexOf(a.worth))
  if (!worst) return frame.say('fail', `The fit gives no Θ_D to compare with the ${figures(entry.debyeTemperatureK)} K of ${entry.name}: β₃ is not above zero.`, { source: entry.source })
  const constant = worst.worth === 'fail' ? constantRatio(context) : undefined
  const suspect = constant === undefined ? '' : ` C is ${figures(constant)} times the handbook curve all over the window: the mass is the first suspect.`
  const note = worst.worth !== 'ok' && entry.note ? ` Note for ${entry.name}: ${entry.note}.` : ''
  return frame.say(worst.worth, `${judged.map(each => each.words).join('; ')}.${suspect}${note}`, { value: worst.value, unit: worst.unit, band: worst.band, source: entry.source })
}

function judge({ thresholds }: CheckContext, name: string, { value, standardError, unit }: Estimate, range: readonly [number, number]): Judged {
  const band = [range[0] * (1 - thresholds.handbookTolerance), range[1] * (1 + thresholds.handbookTolerance)] as const
  const outside = Math.max(0, band[0] - value, value - band[1])
  const miss = value < range[0] ? 1 - value / range[0] : value / range[1] - 1
  const words = `${name} = ${formatUncertainty(value, standardError).compact} ${unit}`
  const handbookWords = range[0] === range[1] ? figures(range[0]) : `${figures(range[0])} to ${figures(range[1])}`
  const number = { value, unit, band }
  if (outside > 2 * standardError) {
    const worth = miss > thresholds.handbookCaution ? 'fail' : 'caution'
    return { ...number, worth, words: `${words} misses the handbook's ${handbookWords} by ${percent(miss)}` }
  }
  // An error as wide as the band itself proves nothing.
  if (standardError > thresholds.handbookCaution * value) return { ...number, worth: 'caution', words: `${words} is too uncertain to compare with the handbook's ${handbookWords}` }
  return { ...number, worth: 'ok', words: `${words} agrees with the handbook's ${handbookWords}` }
}

/** C over the handbook curve, when it is the same within 5 % all over the window. */
function constantRatio(context: CheckContext): number | undefined {
  const { curve, fit } = context
  const ratios = fit.usedIndices.map(index => curve.heatCapacity[index]! / handbookCurve(context, curve.temperatureK[index]!)!).sort((a, b) => a - b)
  const at = (share: number) => ratios[Math.round(share * (ratios.length - 1))]!
  const middle = at(0.5)
  // Nearer to 1 a warm window explains it as well.
  return middle > 0 && (middle < 0.8 || middle > 1.25) && at(0.9) - at(0.1) < 0.1 * middle ? middle : undefined
}
