import type { Check } from '#shared/heat-capacity/checks/context'
import { figures, frameOf } from '#shared/heat-capacity/checks/context'
import { COPPER_REFERENCE_SOURCE } from '#shared/materials/copper-reference'

const frame = frameOf({
  id: 'standard',
  title: 'Last copper reading of the cryostat',
  source: COPPER_REFERENCE_SOURCE,
  why: 'Copper is known; what the cryostat reads on it is the error of the cryostat.\nAn old or drifting reading casts doubt on every result since.',
})

/** How did the same cryostat read copper, last time? */
export const standard: Check = ({ standard: reading, thresholds }) => {
  if (!reading) return frame.skip('No copper reading of this cryostat is known here.')
  const { meanDeviationPercent: deviation, ageDays, limits } = reading
  const [low, high] = limits ?? [-thresholds.standardDeviationPercent, thresholds.standardDeviationPercent]
  const number = { value: deviation, unit: '%', band: [low, high] as const }
  const words = `The last copper reading, ${figures(ageDays, 2)} d ago, lay ${figures(Math.abs(deviation), 2)} % ${deviation < 0 ? 'under' : 'over'} the reference equation`
  if (deviation < low || deviation > high) return frame.say('caution', `${words}, outside the limits of ${figures(low, 2)} % to ${figures(high, 2)} %${limits ? ' of this cryostat' : ''}. Measure copper again.`, number)
  if (ageDays > thresholds.standardAgeDays) return frame.say('caution', `${words}: that is longer than ${thresholds.standardAgeDays} d. Measure copper again.`, number)
  return frame.say('ok', `${words}, within the limits.`, number)
}
