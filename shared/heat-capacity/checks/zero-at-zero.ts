import type { Check } from '#shared/heat-capacity/checks/context'
import { carefulError, coldShare, figures, frameOf, percent, refitIfPossible } from '#shared/heat-capacity/checks/context'
import { formatUncertainty } from '#shared/utils/format-uncertainty'

const frame = frameOf({
  id: 'zero-at-zero',
  title: 'C goes to zero with T',
  source: 'Third law of thermodynamics; three standard errors: common practice',
  why: 'The entropy of a solid ends at absolute zero, so its heat capacity does too.\nA constant left over is addenda, an offset of the thermometer, or a missing term.',
})

/** A constant added to the fit must vanish within its error. */
export const zeroAtZero: Check = (context) => {
  const { fit, thresholds } = context
  const wider = refitIfPossible(context, [...fit.model.terms, 'constant'])
  const constant = wider?.coefficients.constant
  if (!wider || !constant) return frame.skip('There are too few points to add a constant to the fit.')
  const error = carefulError(wider, 'constant')
  const distance = error > 0 ? constant.value / error : 0
  const limit = thresholds.constantStandardErrors
  const number = { value: distance, unit: 'standard errors', band: [-limit, limit] as const }
  const words = `A constant added to the fit comes out as ${formatUncertainty(constant.value, error).compact} mJ/(mol K)`
  if (Math.abs(distance) <= limit) return frame.say('ok', `${words}, zero within ${limit} standard errors.`, number)
  const where = `${words}, ${figures(Math.abs(distance), 2)} standard errors from zero`
  const share = coldShare(context, wider, 'constant')
  if (share < thresholds.negligibleShare) return frame.say('caution', `${where}, but only ${percent(share)} of C at the coldest point. So many points show that the T³ law bends: add β₅T⁵ or lower the warm edge.`, number)
  return frame.say(Math.abs(distance) > thresholds.constantStandardErrorsFail ? 'fail' : 'caution', `${where}. Look for addenda left in, an upturn, or too warm a window.`, number)
}
