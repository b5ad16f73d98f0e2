import type { Check } from '#shared/heat-capacity/checks/context'
import { figures, frameOf, percent } from '#shared/heat-capacity/checks/context'

const frame = frameOf({
  id: 'mass',
  title: 'Mass, density and dimensions',
  source: 'mass = density × volume; levels: common practice',
  why: 'γ and β₃ are as wrong as the mass is, and no fit can tell.\nDensity and dimensions are the only second opinion.',
})

/** Do mass, density and dimensions, where given, agree? */
export const mass: Check = ({ sample, handbook, thresholds }) => {
  const { massMg, massUncertaintyMg, volumeMm3 } = sample
  const density = sample.densityGPerCm3 ?? handbook?.densityGPerCm3
  const band = [0, thresholds.massCaution] as const
  if (massMg !== undefined && volumeMm3 !== undefined && density !== undefined) {
    // g/cm³ × mm³ = mg.
    const miss = massMg / (density * volumeMm3) - 1
    const words = `The mass of ${figures(massMg, 4)} mg is ${figures(1 + miss)} times density × volume (${figures(density * volumeMm3, 4)} mg)`
    const number = { value: Math.abs(miss), unit: '', band }
    if (Math.abs(miss) > thresholds.massFail) return frame.say('fail', `${words}. One of the three is wrong: weigh and measure again.`, number)
    if (Math.abs(miss) > thresholds.massCaution) return frame.say('caution', `${words}. Pores or a wrong dimension may be the reason.`, number)
    return frame.say('ok', `${words}.`, number)
  }
  if (sample.densityGPerCm3 !== undefined && handbook?.densityGPerCm3 !== undefined) {
    const miss = sample.densityGPerCm3 / handbook.densityGPerCm3 - 1
    if (Math.abs(miss) > thresholds.massFail) return frame.say('fail', `The density of ${figures(sample.densityGPerCm3)} g/cm³ is ${percent(Math.abs(miss))} off the handbook's ${figures(handbook.densityGPerCm3)} for ${handbook.name}. Check it.`, { value: Math.abs(miss), unit: '', band, source: handbook.source })
  }
  if (massMg !== undefined && massUncertaintyMg !== undefined) {
    const share = massUncertaintyMg / massMg
    const number = { value: share, unit: '', band: [0, thresholds.massUncertainty] as const }
    if (share > thresholds.massUncertainty) return frame.say('caution', `The mass is known to ${percent(share)} only, and so are γ and β₃. Weigh it again.`, number)
    return frame.say('ok', `The mass is known to ${percent(share)}; dimensions to compare with are not given.`, number)
  }
  return frame.skip('Mass, density and dimensions are not all given, so there is nothing to compare.')
}
