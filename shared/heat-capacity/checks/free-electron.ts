import type { Check } from '#shared/heat-capacity/checks/context'
import { carriersOf, figures, frameOf } from '#shared/heat-capacity/checks/context'
import { freeElectronGas } from '#shared/materials/free-electron'

const frame = frameOf({
  id: 'free-electron',
  title: 'γ against free electrons',
  source: 'Free-electron value: A. Sommerfeld, Z. Phys. 47, 1 (1928); usual span of the ratio: handbook metals, C. Kittel, ch. 6 (from memory)',
  why: 'γ over the free-electron γ₀ is the thermal mass of the electrons, m*/m.\nBand structure and phonons move it by a few, a wrong mass or unit by more.',
})

/** Is γ over the free-electron value ordinary? */
export const freeElectron: Check = (context) => {
  const { sample, fit, thresholds } = context
  const gamma = fit.coefficients.gamma
  if (!gamma) return frame.skip('The model has no γT term.')
  if (sample.kind === 'insulator') return frame.skip('An insulator has no conduction electrons to compare with.')
  const carriers = carriersOf(context)
  if (!carriers) return frame.skip('Conduction electrons per formula unit and density are needed. Enter them in the sample sheet.')
  const { gamma0 } = freeElectronGas(carriers)
  const ratio = gamma.value / gamma0
  const number = { value: ratio, unit: '', band: [thresholds.freeElectronLow, thresholds.freeElectronHigh] as const }
  const words = `γ is ${figures(ratio)} times the free-electron ${figures(gamma0)} mJ/(mol K²)`
  if (ratio <= 0) return frame.say('fail', `${words}: it has the wrong sign. Check model and window.`, number)
  if (ratio > thresholds.freeElectronAbsurd) return frame.say('fail', `${words}, beyond any heavy-electron metal. Check the unit and the mass.`, number)
  if (ratio > thresholds.freeElectronHigh) return frame.say('caution', `${words}. Heavy electrons, a wrong mass or unit, or magnetic parts are candidates.`, number)
  if (ratio < thresholds.freeElectronLow) return frame.say('caution', `${words}. A semimetal, too many conduction electrons in the sheet, or a wrong mass or unit are candidates.`, number)
  return frame.say('ok', `${words}, as in ordinary metals.`, number)
}
