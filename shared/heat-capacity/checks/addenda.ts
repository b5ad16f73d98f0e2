import type { Check } from '#shared/heat-capacity/checks/context'
import { figures, frameOf, percent } from '#shared/heat-capacity/checks/context'

const frame = frameOf({
  id: 'addenda',
  title: 'Share of the addenda',
  source: 'common practice, no source',
  why: 'What is left after a large subtraction carries the errors of both.\nA few per cent of the addenda can be all of γ.',
})

/** Which share of the total is addenda? */
export const addenda: Check = ({ addenda: taken, curve, fit, thresholds }) => {
  if (!taken) return frame.skip('No addenda were given: the table is taken to be of the sample alone.')
  const inside = fit.usedIndices.map(index => ({ share: taken.share[index]!, temperatureK: curve.temperatureK[index]! }))
  const largest = inside.reduce((worst, each) => each.share > worst.share ? each : worst)
  const number = { value: largest.share, unit: '', band: [0, thresholds.addendaCaution] as const }
  const words = `Addenda make up to ${percent(largest.share)} of the total in the window (at ${figures(largest.temperatureK)} K)`
  if (largest.share > thresholds.addendaFail) return frame.say('fail', `${words}: the sample is lost in them. Take a heavier sample or lighter addenda.`, number)
  if (largest.share > thresholds.addendaCaution) return frame.say('caution', `${words}, more than the sample itself. Their uncertainty decides.`, number)
  return frame.say('ok', `${words}.`, number)
}
