import type { Check, CheckContext } from '#shared/heat-capacity/checks/context'
import { figures, frameOf, percent, usedRangeK } from '#shared/heat-capacity/checks/context'
import { fittedHeatCapacity } from '#shared/heat-capacity/plot-series'

const frame = frameOf({
  id: 'repeat',
  title: 'Repeats and sweeps',
  source: 'common practice, no source',
  why: 'The same point twice must give the same value.\nA difference between sweeps is a thermometer or a sample out of equilibrium.',
})

/** Temperatures within this share of each other count as the same. */
const SAME_TEMPERATURE = 0.002

/** Do repeated or up and down sweeps agree? */
export const repeat: Check = (context) => {
  const { thresholds } = context
  const pairs = pairsOf(context)
  if (pairs.length === 0) return frame.skip('No temperature was measured twice.')
  const spread = Math.sqrt(pairs.reduce((sum, pair) => sum + pair.difference ** 2, 0) / pairs.length / 2)
  // Known errors excuse as much of the spread as they say.
  const excused = Math.sqrt(pairs.reduce((sum, pair) => sum + pair.variance, 0) / pairs.length / 2)
  const judged = Math.sqrt(Math.max(0, spread ** 2 - excused ** 2))
  const number = { value: judged, unit: '', band: [0, thresholds.repeatCaution] as const }
  const worst = pairs.reduce((most, pair) => Math.abs(pair.difference) > Math.abs(most.difference) ? pair : most)
  const words = `${pairs.length === 1 ? 'One pair' : `${pairs.length} pairs`} of repeats differ by ${percent(spread)} (one standard deviation), at most near ${figures(worst.temperatureK)} K`
  if (judged > thresholds.repeatFail) return frame.say('fail', `${words}. Find out which sweep to trust, and leave the other out.`, number)
  if (judged > thresholds.repeatCaution) return frame.say('caution', `${words}, more than their errors allow.`, number)
  return frame.say('ok', `${words}.`, number)
}

interface Pair { readonly temperatureK: number, readonly difference: number, readonly variance: number }

/**
 * Neighbours in temperature that are not neighbours in the file, or of exactly one temperature. Values are compared over the fit, so
 * that a small difference in temperature does not count.
 */
function pairsOf(context: CheckContext): Pair[] {
  const { curve, fit } = context
  const [coldest, warmest] = usedRangeK(context)
  const pairs: Pair[] = []
  for (let index = 1; index < curve.temperatureK.length; index += 1) {
    const [before, here] = [curve.temperatureK[index - 1]!, curve.temperatureK[index]!]
    if (before < coldest || here > warmest || here - before > SAME_TEMPERATURE * here) continue
    const rows = curve.rowNumbers
    const apart = rows !== undefined && Math.abs(rows[index]! - rows[index - 1]!) > 1
    if (here !== before && !apart) continue
    const over = [index - 1, index].map(each => curve.heatCapacity[each]! / fittedHeatCapacity(fit, curve.temperatureK[each]!))
    const variance = curve.sigma ? [index - 1, index].reduce((sum, each) => sum + (curve.sigma![each]! / curve.heatCapacity[each]!) ** 2, 0) : 0
    pairs.push({ temperatureK: here, difference: over[1]! - over[0]!, variance })
  }
  return pairs
}
