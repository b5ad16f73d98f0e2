import { cooldownLitres, SPECIFIC_HEAT_UNCERTAINTY } from '#shared/planning/cooldown'
import { eightyPercent } from '#shared/planning/learning'
import type { CryostatPlanningFacts, HeliumPart, Interval, Uncertain } from '#shared/planning/types'

/** What the helium of a run is computed from, once hours and learned values are known. */
export interface HeliumInputs {
  readonly cryostat: CryostatPlanningFacts
  readonly startTemperatureK: number
  readonly gasUseShare: Uncertain
  readonly staticBoilOffLitresPerHour: Uncertain
  readonly measureHours: Uncertain
  readonly sweeps: number
}

/** Helium of a run, litres taken from storage. */
export interface HeliumEstimate {
  readonly parts: Readonly<Record<HeliumPart, Interval>>
  readonly total: Uncertain
  /** Drawn from storage during the cooldown (with the first fill) and during the measurement (refills). */
  readonly drawnInCooldown: Uncertain
  readonly drawnInMeasurement: Uncertain
  /** How often the bath is refilled while measuring. */
  readonly refills: number
}

const NOTHING: Uncertain = { mean: 0, sd: 0 }
const root = (...parts: readonly number[]): number => Math.hypot(...parts)

/** Product of two independent uncertain quantities, to first order, with the second-order term that keeps it right near zero. */
function product(a: Uncertain, b: Uncertain): Uncertain {
  return { mean: a.mean * b.mean, sd: root(a.mean * b.sd, b.mean * a.sd, a.sd * b.sd) }
}

/** Cooldown litres with the spread that the share of the gas enthalpy and the specific heats give them. */
function cooldown({ cryostat, startTemperatureK, gasUseShare }: HeliumInputs): Uncertain {
  const at = (share: number): number => cooldownLitres(cryostat.coldMass, startTemperatureK, Math.min(1, Math.max(0, share)))
  const mean = at(gasUseShare.mean)
  const halfSpread = Math.abs(at(gasUseShare.mean - gasUseShare.sd) - at(gasUseShare.mean + gasUseShare.sd)) / 2
  return { mean, sd: root(halfSpread, SPECIFIC_HEAT_UNCERTAINTY * mean) }
}

/**
 * Helium a run takes from storage. The bath is filled after the cooldown; what boils off while measuring comes out of the
 * bath first, then out of refills; what the bath still holds at the end (`fill`) boils away to recovery in warm-up.
 *
 * @param inputs Cryostat, learned values and hours.
 * @returns Parts with 80 % intervals, whose likely values add up to the likely total; nothing at all for a closed cycle.
 * @throws DomainError when the start temperature or a mass cannot be.
 */
export function estimateHelium(inputs: HeliumInputs): HeliumEstimate {
  const { cryostat, measureHours, sweeps } = inputs
  if (cryostat.kind === 'closed-cycle') {
    const none = eightyPercent(NOTHING)
    return {
      parts: { cooldown: none, fill: none, transferLoss: none, staticBoilOff: none, measurement: none },
      total: NOTHING, drawnInCooldown: NOTHING, drawnInMeasurement: NOTHING, refills: 0,
    }
  }
  const cooling = cooldown(inputs)
  const staticBoilOff = product(inputs.staticBoilOffLitresPerHour, measureHours)
  const extra = product(cryostat.measurementLitresPerHour, measureHours)
  const measurement: Uncertain = {
    mean: extra.mean + sweeps * cryostat.sweepLitres.mean,
    sd: root(extra.sd, sweeps * cryostat.sweepLitres.sd),
  }
  const boiled: Uncertain = { mean: staticBoilOff.mean + measurement.mean, sd: root(staticBoilOff.sd, measurement.sd) }
  const lowest = cryostat.fillLitres * cryostat.lowestLevelShare
  const usable = cryostat.fillLitres - lowest
  const left = Math.max(cryostat.fillLitres - boiled.mean, lowest)
  const refilled = Math.max(0, boiled.mean - usable)

  // While the bath lasts, what boils off and what is left trade places; only beyond that does more boil-off draw more.
  const leftSd = refilled > 0 ? 0 : Math.min(boiled.sd, left)
  const lossFactor = 1 / (1 - cryostat.transferLossShare.mean)
  const beforeLoss = cooling.mean + boiled.mean + left
  const lossSd = beforeLoss * cryostat.transferLossShare.sd * lossFactor ** 2
  const drawnSd = root(cooling.sd, refilled > 0 ? boiled.sd : 0)
  const share = (mean: number): number => beforeLoss > 0 ? lossSd * mean / beforeLoss : 0

  return {
    parts: {
      cooldown: eightyPercent(cooling),
      fill: eightyPercent({ mean: left, sd: leftSd }),
      transferLoss: eightyPercent({ mean: beforeLoss * (lossFactor - 1), sd: root(lossSd, drawnSd * (lossFactor - 1)) }),
      staticBoilOff: eightyPercent(staticBoilOff),
      measurement: eightyPercent(measurement),
    },
    total: { mean: beforeLoss * lossFactor, sd: root(drawnSd * lossFactor, lossSd) },
    drawnInCooldown: {
      mean: (cooling.mean + cryostat.fillLitres) * lossFactor,
      sd: root(cooling.sd * lossFactor, share(cooling.mean + cryostat.fillLitres)),
    },
    drawnInMeasurement: {
      mean: refilled * lossFactor,
      sd: refilled > 0 ? root(boiled.sd * lossFactor, share(refilled)) : 0,
    },
    refills: usable > 0 ? Math.ceil(refilled / usable) : 0,
  }
}
