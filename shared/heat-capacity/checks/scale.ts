import type { Check, CheckContext } from '#shared/heat-capacity/checks/context'
import { figures, frameOf } from '#shared/heat-capacity/checks/context'
import { debyeHeatCapacity } from '#shared/heat-capacity/debye'
import { slipNear } from '#shared/heat-capacity/slips'
import { GAS_CONSTANT_J_PER_MOL_K } from '#shared/materials/constants'

const frame = frameOf({
  id: 'scale',
  title: 'Size of the heat capacity',
  source: 'Dulong and Petit, 3R per mole of atoms, and the Debye function; no solid is stiffer than diamond (2230 K), Θ_D falling with the root of the mean atomic mass (Lindemann): common practice',
  why: 'A factor of 1000, or of the molar mass, is the commonest slip of all.\nIt moves γ and β₃ together, so the fit itself looks perfect.',
})

/** Θ_D of diamond, K, and the mass of its atom, g/mol: the stiffest lattice there is. */
const STIFFEST_K = 2300
const STIFFEST_ATOM_G_PER_MOL = 12.011
/** Below this share of 3rR steepness says nothing: phonon humps of real solids reach it. */
const SHARE_ALWAYS_ALLOWED = 0.15

/** At the warm end, is C under the classical limit and not absurdly small; and near the handbook curve where there is one? */
export const scale: Check = (context) => {
  const { curve, sample, thresholds } = context
  const last = curve.temperatureK.length - 1
  const temperature = curve.temperatureK[last]!
  const value = curve.heatCapacity[last]!
  const classical = 3000 * sample.atomsPerFormulaUnit * GAS_CONSTANT_J_PER_MOL_K
  const share = value / classical
  const [low, high] = bandOf(context, temperature)
  const number = { value: share, unit: '3rR', band: [low, high] as const }
  const place = `At ${figures(temperature)} K C is ${figures(value)} mJ/(mol K), ${figures(share)} of the classical 3rR`
  const expected = handbookCurve(context, temperature)
  if (expected !== undefined) {
    const ratio = value / expected
    const slip = slipNear(ratio, sample)
    const words = `${place}, and ${figures(ratio)} times what ${context.handbook!.name} has`
    if (ratio > thresholds.scaleHandbookFail || ratio < 1 / thresholds.scaleHandbookFail) {
      return frame.say('fail', `${words}. ${slip ? `That is close to ${slip.words}.` : 'Check the unit, the mass and the formula.'}`, number)
    }
    if (ratio > thresholds.scaleHandbookCaution || ratio < 1 / thresholds.scaleHandbookCaution) return frame.say('caution', `${words}. ${slip ? `That is close to ${slip.words}.` : 'Check the mass and the formula.'}`, number)
    return frame.say('ok', `${words}.`, number)
  }
  if (share > high) return frame.say('fail', `${place}, more than a solid can have where C still rises so steeply (${figures(high)}). A factor of about 1000 (mJ taken for J) or of the molar mass (${figures(sample.molarMassGPerMol)}) is the likely slip.`, number)
  if (share < low / 3) return frame.say('fail', `${place}, less than the stiffest lattice of such atoms would have (${figures(low)}). A factor of about 1000 (J taken for mJ) or of the molar mass (${figures(sample.molarMassGPerMol)}) is the likely slip.`, number)
  if (share < low) return frame.say('caution', `${place}, somewhat less than the stiffest lattice of such atoms would have (${figures(low)}). Check unit, mass and formula.`, number)
  return frame.say('ok', `${place}, within what a solid can have.`, number)
}

function bandOf({ curve, sample, thresholds }: CheckContext, temperature: number): [number, number] {
  const meanAtom = sample.molarMassGPerMol / sample.atomsPerFormulaUnit
  const stiffestK = STIFFEST_K * Math.sqrt(STIFFEST_ATOM_G_PER_MOL / Math.max(meanAtom, STIFFEST_ATOM_G_PER_MOL / 4))
  const low = debyeHeatCapacity(temperature / stiffestK)
  const steep = thresholds.scaleLatticeAllowance * shareOfLatticeRisingAs(warmExponent(curve))
  return [low, Math.min(thresholds.scaleClassicalExcess, Math.max(SHARE_ALWAYS_ALLOWED, steep))]
}

/** Exponent n of C ∝ Tⁿ over the warm third of the curve, by a straight line through ln C against ln T. */
function warmExponent({ temperatureK, heatCapacity }: CheckContext['curve']): number {
  const last = temperatureK.length - 1
  const from = temperatureK[last]! * (temperatureK[0]! / temperatureK[last]!) ** (1 / 3)
  const points = temperatureK.map((t, index) => [Math.log(t), Math.log(heatCapacity[index]!), t] as const).filter(([, y, t]) => t >= from && Number.isFinite(y))
  if (points.length < 2) return 0
  const mean = (pick: 0 | 1) => points.reduce((sum, point) => sum + point[pick], 0) / points.length
  const [meanX, meanY] = [mean(0), mean(1)]
  const spread = points.reduce((sum, [x]) => sum + (x - meanX) ** 2, 0)
  return spread === 0 ? 0 : points.reduce((sum, [x, y]) => sum + (x - meanX) * (y - meanY), 0) / spread
}

/** C/(3rR) of a Debye lattice where its C rises as Tⁿ; the steeper, the colder and the smaller. */
function shareOfLatticeRisingAs(exponent: number): number {
  let [cold, warm] = [1e-3, 10]
  for (let step = 0; step < 50; step += 1) {
    const middle = Math.sqrt(cold * warm)
    const steepness = Math.log(debyeHeatCapacity(middle * 1.01) / debyeHeatCapacity(middle / 1.01)) / (2 * Math.log(1.01))
    if (steepness > exponent) cold = middle
    else warm = middle
  }
  return debyeHeatCapacity(cold)
}

/** C of the handbook's γ and Θ_D, mJ/(mol K); undefined for a material it does not have. */
export function handbookCurve({ handbook }: Pick<CheckContext, 'handbook'>, temperatureK: number): number | undefined {
  return handbook && handbook.gamma * temperatureK + 3000 * handbook.atomsPerFormulaUnit * GAS_CONSTANT_J_PER_MOL_K * debyeHeatCapacity(temperatureK / handbook.debyeTemperatureK)
}
