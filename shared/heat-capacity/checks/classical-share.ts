import type { Check } from '#shared/heat-capacity/checks/context'
import { figures, frameOf, percent, usedRangeK } from '#shared/heat-capacity/checks/context'
import { GAS_CONSTANT_J_PER_MOL_K } from '#shared/materials/constants'

const frame = frameOf({
  id: 'classical-share',
  title: 'Electrons against the classical gas',
  source: 'A. Sommerfeld, Z. Phys. 47, 1 (1928): share = (π²/3) T/T_F of 3/2 R per mole of electrons',
  why: 'Only electrons within kT of the Fermi level take up heat: a small fraction.\nA share near one means that γ does not belong to conduction electrons.',
})

/** The electronic heat capacity must be a small fraction of 3/2 R per mole of conduction electrons; shows the Fermi temperature. */
export const classicalShare: Check = (context) => {
  const { sample, fit, handbook, thresholds } = context
  const gamma = fit.coefficients.gamma
  if (!gamma) return frame.skip('The model has no γT term.')
  if (sample.kind === 'insulator') return frame.skip('An insulator has no conduction electrons.')
  const electrons = sample.conductionElectrons ?? handbook?.conductionElectrons
  if (!electrons) return frame.skip('Conduction electrons per formula unit are needed. Enter them in the sample sheet.')
  if (!(gamma.value > 0)) return frame.skip('γ is not above zero, so there is no electronic heat capacity to compare.')
  const warmest = usedRangeK(context)[1]
  const share = gamma.value * warmest / (1500 * GAS_CONSTANT_J_PER_MOL_K * electrons)
  const fermiTemperatureK = Math.PI ** 2 / 2 * electrons * GAS_CONSTANT_J_PER_MOL_K * 1000 / gamma.value
  const number = { value: share, unit: '', band: [0, thresholds.classicalShareCaution] as const }
  const words = `At ${figures(warmest)} K the electrons take ${percent(share)} of the classical 3/2 R; γ stands for a Fermi temperature of ${figures(fermiTemperatureK)} K`
  if (share >= 1) return frame.say('fail', `${words}, which no electron gas can have. Check unit and mass.`, number)
  if (share > thresholds.classicalShareCaution) return frame.say('caution', `${words}. That is much, even for heavy electrons: check unit and mass.`, number)
  return frame.say('ok', `${words}.`, number)
}
