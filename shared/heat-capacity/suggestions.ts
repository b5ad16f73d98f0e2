import type { CheckContext } from '#shared/heat-capacity/checks/context'
import { debyeRange } from '#shared/heat-capacity/checks/debye-range'
import { handbook } from '#shared/heat-capacity/checks/handbook'
import { handbookCurve, scale } from '#shared/heat-capacity/checks/scale'
import { profileOf } from '#shared/heat-capacity/checks/profile'
import { usedRangeK } from '#shared/heat-capacity/checks/context'
import type { CheckResult, CorrectionSuggestion, HeatCapacityCurve } from '#shared/heat-capacity/types'
import { slipsFor } from '#shared/heat-capacity/slips'

/** The checks that a slip of unit or mass breaks together. */
const BROKEN_TOGETHER = [scale, handbook, debyeRange] as const

/** What naming slips needs beside the checks' view. */
export interface SuggestionInput {
  readonly context: CheckContext
  readonly checks: readonly CheckResult[]
  /** Whether the table is per whole sample, so that the mass was used. */
  readonly massEntersConversion: boolean
  /** The view of the same result with every measured heat capacity multiplied, before addenda are taken off; undefined when nothing is left. */
  readonly contextWith: (factor: number) => CheckContext | undefined
}

/**
 * Names likely slips: conversions that alone bring scale, handbook and debye-range into band, or addenda that were forgotten.
 *
 * @param input the result and a way to look at it converted
 * @returns conversions first, the best one foremost; none when the three checks stand
 */
export function suggestCorrections(input: SuggestionInput): CorrectionSuggestion[] {
  const { context, checks, massEntersConversion } = input
  const broken = checks.filter(check => check.status === 'fail' || (check.id === 'scale' && check.status === 'caution')).map(check => check.id)
  if (!broken.some(id => id === 'scale' || id === 'handbook' || id === 'debye-range')) return []
  const mended = slipsFor(context.sample, massEntersConversion).flatMap((slip) => {
    const factor = 1 / slip.ratio
    const converted = input.contextWith(factor)
    if (!converted) return []
    const results = BROKEN_TOGETHER.map(check => check(converted))
    const inBand = results.every(result => result.status === 'ok' || result.status === 'not-applicable' || (result.id !== 'scale' && result.status === 'caution'))
    return inBand ? [{ rank: results.filter(result => result.status === 'caution').length, suggestion: { id: slip.id, factor, message: `The values look off by ${slip.words}. ${slip.remedy} Scale, handbook and Debye temperature then fall into band.` } }] : []
  })
  mended.sort((a, b) => a.rank - b.rank)
  if (mended.length > 0) return mended.map(each => each.suggestion)
  return addendaForgotten(context) ? [{ id: 'addenda-forgotten', factor: 1, message: `C lies above the handbook curve of ${context.handbook!.name} all over the window, by no constant factor, and no addenda were given. Upload the addenda of this holder.` }] : []
}

/**
 * A curve with every heat capacity and σ multiplied by one factor.
 *
 * @param curve mJ/(mol K)
 * @param factor above zero
 */
export function scaledCurve(curve: HeatCapacityCurve, factor: number): HeatCapacityCurve {
  return { ...curve, heatCapacity: curve.heatCapacity.map(value => value * factor), ...(curve.sigma ? { sigma: curve.sigma.map(value => value * factor) } : {}) }
}

/** Θ_D/T down to which a Debye curve of the low-temperature Θ_D is good to a few per cent; real phonon spectra leave it soon after. */
const CURVE_DIVISOR = 40

/** Excess over the handbook curve that is everywhere above 8 %, under tenfold, and not one factor. */
function addendaForgotten(context: CheckContext): boolean {
  if (!context.handbook || context.addenda) return false
  // Warmer than that the handbook curve itself, one Θ_D for all temperatures, is too low.
  if (usedRangeK(context)[1] > context.handbook.debyeTemperatureK / CURVE_DIVISOR) return false
  const ratios = profileOf(context.curve, usedRangeK(context)).map(bin => bin.ratio * bin.temperatureK / handbookCurve(context, bin.temperatureK)!)
  const [least, most] = [Math.min(...ratios), Math.max(...ratios)]
  return least > 1.08 && most < 10 && most > 1.1 * least
}
