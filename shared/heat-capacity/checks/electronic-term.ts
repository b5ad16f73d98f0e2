import type { Check } from '#shared/heat-capacity/checks/context'
import { carefulError, coldShare, figures, frameOf, percent, usedRangeK } from '#shared/heat-capacity/checks/context'
import { formatUncertainty } from '#shared/utils/format-uncertainty'

const frame = frameOf({
  id: 'electronic-term',
  title: 'Electronic term',
  source: 'A metal has γ > 0, an insulator none: A. Sommerfeld, Z. Phys. 47, 1 (1928); three standard errors: common practice',
  why: 'Electrons at the Fermi level give a term linear in T; without them there is none.\nA γ that contradicts the material points to a wrong model, window or sample.',
})

/** Metal: is γ above zero by three standard errors? Insulator: is it zero within them? */
export const electronicTerm: Check = (context) => {
  const { sample, fit, thresholds } = context
  const gamma = fit.coefficients.gamma
  if (!gamma) {
    return sample.kind === 'metal'
      ? frame.say('caution', 'The model has no γT term, although the sample is said to be a metal. Add it.')
      : frame.skip('The model has no γT term.')
  }
  const error = carefulError(fit, 'gamma')
  const distance = gamma.value / error
  const limit = thresholds.electronicStandardErrors
  const value = `γ = ${formatUncertainty(gamma.value, error).compact} mJ/(mol K²)`
  const apart = `${figures(Math.abs(distance), 2)} standard errors ${distance < 0 ? 'below' : 'above'} zero`
  const number = { value: distance, unit: 'standard errors' }
  if (sample.kind === 'insulator') {
    const band = { ...number, band: [-limit, limit] as const }
    if (Math.abs(distance) <= limit) return frame.say('ok', `${value} is zero within ${limit} standard errors, as for an insulator.`, band)
    const share = coldShare(context, fit, 'gamma')
    if (share < thresholds.negligibleShare) return frame.say('caution', `${value} is ${apart}, but only ${percent(share)} of C at the coldest point: the model bends away a little from so many points.`, band)
    return frame.say('fail', `${value} is ${apart}, but an insulator has none. ${distance > 0 ? 'It conducts, holds glassy or magnetic parts, or addenda are left in.' : 'The window is too warm, or the model lacks a term.'}`, band)
  }
  if (sample.kind === 'superconductor' && sample.criticalTemperatureK !== undefined && usedRangeK(context)[0] < sample.criticalTemperatureK) {
    return frame.skip(`The window reaches below T_c = ${figures(sample.criticalTemperatureK)} K, where the electrons have no linear term.`)
  }
  if (sample.kind === 'unknown') {
    const seems = distance >= limit ? 'a metal' : distance >= -limit ? 'an insulator' : 'neither a metal nor an insulator'
    return frame.skip(`The kind of material is not stated; ${value}, ${apart}, would suit ${seems}.`)
  }
  const band = { ...number, band: [limit, null] as const }
  if (distance >= limit) return frame.say('ok', `${value} is ${apart}, as for a metal.`, band)
  return frame.say('fail', `${value} is ${distance < 0 ? apart : `only ${apart}`}, but a metal has γ > 0. The sample may be an insulator, or the model or window is wrong.`, band)
}
