import type { Check } from '#shared/heat-capacity/checks/context'
import { figures, frameOf, percent, usedRangeK } from '#shared/heat-capacity/checks/context'
import type { ProfileBin } from '#shared/heat-capacity/checks/profile'
import { profileOf } from '#shared/heat-capacity/checks/profile'
import { median } from '#shared/heat-capacity/statistics'
import { BCS_JUMP_RATIO } from '#shared/materials/constants'

const frame = frameOf({
  id: 'transition',
  title: 'Transition in the window',
  source: 'ΔC/γT_c = 1.43 in weak coupling: Bardeen, Cooper and Schrieffer, Phys. Rev. 108, 1175 (1957); size of a step: common practice',
  why: 'γT + β₃T³ holds on one side of a transition, never across it.\nBelow a superconducting transition the linear term of the electrons is gone.',
})

const MOST_NEIGHBOURS = 6
const FEWEST_NEIGHBOURS = 3
/** A step stands out when it is so many times the usual unevenness between neighbouring places. */
const OVER_UNEVENNESS = 4

/** A step of ln(C/T) between two neighbouring bins. */
interface Step {
  readonly temperatureK: number
  /** C/T below over C/T above, less one. */
  readonly rise: number
  /** The same in its standard errors. */
  readonly distance: number
  /** C/T just above, mJ/(mol K²). */
  readonly above: number
}

/** Is there a jump inside the window, or does the window lie below the stated T_c? */
export const transition: Check = (context) => {
  const { curve, sample, handbook, thresholds } = context
  const [coldest, warmest] = usedRangeK(context)
  const band = { unit: '', band: [-thresholds.transitionJump, thresholds.transitionJump] as const }
  const tc = sample.criticalTemperatureK
  if (sample.kind === 'superconductor' && tc !== undefined && coldest < tc) {
    const where = warmest > tc ? 'lies inside the window' : 'lies above the whole window'
    return frame.say('fail', `T_c = ${figures(tc)} K ${where}; γT + β₃T³ holds only above it. Raise the cold edge over T_c.`, { ...band, value: stepsOf(profileOf(curve, [coldest, warmest]))[0]?.rise })
  }
  const bins = profileOf(curve, [coldest, warmest])
  const steps = stepsOf(bins)
  const largest = steps[0]
  if (!largest) return frame.skip('There are too few points to look for a step.')
  const unevenness = median(steps.map(step => Math.abs(Math.log1p(step.rise))))
  const found = Math.abs(largest.rise) > thresholds.transitionJump && Math.abs(largest.distance) > thresholds.transitionStandardErrors
    && Math.abs(Math.log1p(largest.rise)) > OVER_UNEVENNESS * unevenness
  const number = { ...band, value: largest.rise }
  if (found) {
    const gamma = gammaAbove(bins, largest.temperatureK)
    const strength = largest.rise > 0 && gamma !== undefined ? `; ΔC/γT_c is about ${figures(largest.rise * largest.above / gamma, 2)}, where weak coupling gives ${figures(BCS_JUMP_RATIO)}` : ''
    return frame.say('fail', `C/T ${largest.rise > 0 ? 'drops' : 'rises'} by ${percent(Math.abs(largest.rise))} on warming through ${figures(largest.temperatureK)} K${strength}. Fit on one side of it only.`, number)
  }
  const known = handbook?.criticalTemperatureK
  if (known !== undefined && coldest < known) {
    return frame.say('caution', `${handbook!.name} is superconducting below ${figures(known)} K in zero field, and the window reaches down to ${figures(coldest)} K. Fit above it, unless a field held the sample normal.`, number)
  }
  return frame.say('ok', `No step in C/T stands out between ${figures(coldest)} K and ${figures(warmest)} K.`, number)
}

/** All steps, the largest first, from straight lines through ln(C/T) against ln T on either side. */
function stepsOf(bins: readonly ProfileBin[]): Step[] {
  const points = bins.filter(bin => bin.ratio > 0).map(bin => ({ x: Math.log(bin.temperatureK), y: Math.log(bin.ratio), error: bin.standardError / bin.ratio }))
  const steps: Step[] = []
  for (let split = FEWEST_NEIGHBOURS; split <= points.length - FEWEST_NEIGHBOURS; split += 1) {
    const middle = (points[split - 1]!.x + points[split]!.x) / 2
    const below = lineAt(points.slice(Math.max(0, split - MOST_NEIGHBOURS), split), middle)
    const above = lineAt(points.slice(split, split + MOST_NEIGHBOURS), middle)
    const jump = below.value - above.value
    const error = Math.hypot(below.error, above.error)
    steps.push({ temperatureK: Math.exp(middle), rise: Math.expm1(jump), distance: error > 0 ? jump / error : jump === 0 ? 0 : Infinity, above: Math.exp(above.value) })
  }
  return steps.sort((a, b) => Math.abs(Math.log1p(b.rise)) - Math.abs(Math.log1p(a.rise)))
}

function lineAt(points: readonly { x: number, y: number, error: number }[], x: number): { value: number, error: number } {
  const count = points.length
  const meanX = points.reduce((sum, point) => sum + point.x, 0) / count
  const meanY = points.reduce((sum, point) => sum + point.y, 0) / count
  const spread = points.reduce((sum, point) => sum + (point.x - meanX) ** 2, 0)
  const slope = spread > 0 ? points.reduce((sum, point) => sum + (point.x - meanX) * (point.y - meanY), 0) / spread : 0
  const noise = Math.sqrt(points.reduce((sum, point) => sum + point.error ** 2, 0) / count)
  return { value: meanY + slope * (x - meanX), error: noise * Math.sqrt(1 / count + (spread > 0 ? (x - meanX) ** 2 / spread : 0)) }
}

/** γ above a step: where the straight line of C/T against T² meets T = 0; undefined with too few places or a γ that is none. */
function gammaAbove(bins: readonly ProfileBin[], temperatureK: number): number | undefined {
  const points = bins.filter(bin => bin.temperatureK > temperatureK).map(bin => ({ x: bin.temperatureK ** 2, y: bin.ratio, error: 0 }))
  if (points.length < FEWEST_NEIGHBOURS) return undefined
  const { value } = lineAt(points, 0)
  return value > 0 ? value : undefined
}
