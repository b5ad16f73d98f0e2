import { DomainError } from '#shared/errors'
import { heatLoadW, OUTGOING_GAS_SHARE } from '#shared/helium/properties'
import { MS_PER_HOUR } from '#shared/units/helium-units'

/** A level reading, as liquid in the vessel. */
export interface LevelReading {
  /** Instant, ms UTC. */
  readonly atMs: number
  /** Liquid, litres. */
  readonly litres: number
}

/** A stretch of time in which liquid was poured; nothing can be said about boil-off in it. */
export interface TransferWindow {
  readonly startMs: number
  readonly endMs: number
}

/** Boil-off between two readings. */
export interface BoilOffStretch {
  readonly fromMs: number
  readonly toMs: number
  /** Fall of the liquid, litres per hour; below zero when the level rose. */
  readonly litresPerHour: number
}

/** The usual boil-off of a cryostat. */
export interface BoilOffBand {
  readonly lowLitresPerHour: number
  readonly medianLitresPerHour: number
  readonly highLitresPerHour: number
  /** Number of stretches it rests on. */
  readonly count: number
}

/** What a reading says against the usual band. */
export interface BoilOffJudgement {
  readonly status: 'usual' | 'high' | 'low' | 'rising' | 'no-band'
  /** One plain sentence: the number, the band, and what to look at. */
  readonly why: string
}

/** Two readings closer than this say more about the gauge than about boil-off, hours (common practice, no source). */
export const SHORTEST_STRETCH_HOURS = 0.5

/** Stretches needed before a band means anything (common practice, no source). */
export const FEWEST_STRETCHES = 5

/** MAD of a normal distribution times this is its standard deviation: 1/Φ⁻¹(3/4). */
const MAD_TO_SIGMA = 1.4826022185056018

/** Band half-width is at least this share of the median, because gauges read to about a percent or two (common practice, no source). */
const SMALLEST_HALF_WIDTH = 0.1

/**
 * Boil-off between successive level readings, leaving out every stretch that a transfer touches. Readings closer than half
 * an hour are joined to the next.
 *
 * @param readings Level readings as litres, any order.
 * @param transfers Stretches in which liquid was poured, ms UTC.
 * @param shortestHours Shortest stretch worth a rate, hours.
 * @returns Stretches in order of time with their rate, L/h.
 * @throws DomainError when a reading is no number.
 */
export function boilOffStretches(
  readings: readonly LevelReading[], transfers: readonly TransferWindow[], shortestHours = SHORTEST_STRETCH_HOURS,
): BoilOffStretch[] {
  const sorted = [...readings].sort((a, b) => a.atMs - b.atMs)
  const stretches: BoilOffStretch[] = []
  let from: LevelReading | undefined
  for (const reading of sorted) {
    if (!Number.isFinite(reading.atMs) || !Number.isFinite(reading.litres)) {
      throw new DomainError('invalid', 'A level reading is not a number. Correct that reading.', ['readings'])
    }
    const start = from
    if (!start) {
      from = reading
      continue
    }
    const poured = transfers.some(({ startMs, endMs }) => startMs < reading.atMs && endMs > start.atMs)
    const hours = (reading.atMs - start.atMs) / MS_PER_HOUR
    if (!poured && hours < shortestHours) continue
    if (!poured) stretches.push({ fromMs: start.atMs, toMs: reading.atMs, litresPerHour: (start.litres - reading.litres) / hours })
    from = reading
  }
  return stretches
}

/**
 * Median of numbers.
 *
 * @param values One or more numbers.
 * @returns Median; NaN for none.
 */
export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b)
  const middle = sorted.length >> 1
  const upper = sorted[middle] ?? Number.NaN
  return sorted.length % 2 === 1 ? upper : ((sorted[middle - 1] ?? Number.NaN) + upper) / 2
}

/**
 * Usual boil-off band of a cryostat from its past: median ± k robust standard deviations (1.4826 × the median absolute
 * deviation), so that a few bad readings or quenches in the past do not widen it.
 *
 * @param litresPerHour Rates of the past, L/h.
 * @param k Half-width in robust standard deviations; 3 when left out.
 * @returns The band, not below zero and never narrower than ±10 % of the median; undefined with fewer than five rates.
 * Source: robust location and scale, e.g. P. J. Huber, Robust Statistics (from memory).
 */
export function usualBoilOffBand(litresPerHour: readonly number[], k = 3): BoilOffBand | undefined {
  const rates = litresPerHour.filter(Number.isFinite)
  if (rates.length < FEWEST_STRETCHES) return undefined
  const middle = median(rates)
  const sigma = MAD_TO_SIGMA * median(rates.map(rate => Math.abs(rate - middle)))
  const halfWidth = Math.max(k * sigma, SMALLEST_HALF_WIDTH * Math.abs(middle))
  return {
    lowLitresPerHour: Math.max(0, middle - halfWidth),
    medianLitresPerHour: middle,
    highLitresPerHour: middle + halfWidth,
    count: rates.length,
  }
}

const rateText = (litresPerHour: number): string => `${litresPerHour.toFixed(2).replace('-', '−')}\u2009L/h`

/**
 * Judges a boil-off against the usual band of its cryostat.
 *
 * @param litresPerHour Rate seen, L/h.
 * @param band The usual band, undefined while there is too little past.
 * @param name Cryostat, for the sentence.
 * @returns Status and why, in one plain sentence.
 */
export function judgeBoilOff(litresPerHour: number, band: BoilOffBand | undefined, name: string): BoilOffJudgement {
  if (litresPerHour < 0) {
    return { status: 'rising', why: `The level of ${name} rose by ${rateText(-litresPerHour)} without a logged transfer: log the transfer, or check the gauge.` }
  }
  if (!band) {
    return { status: 'no-band', why: `${name} boils off ${rateText(litresPerHour)}; it has fewer than ${FEWEST_STRETCHES} stretches on record, so there is no usual band yet.` }
  }
  const usual = `its usual ${band.lowLitresPerHour.toFixed(2)} to ${rateText(band.highLitresPerHour)} (${band.count} stretches)`
  if (litresPerHour > band.highLitresPerHour) {
    const extraW = heatLoadW(litresPerHour - band.medianLitresPerHour)
    return { status: 'high', why: `${name} boils off ${rateText(litresPerHour)}, over ${usual}; about ${extraW.toPrecision(2)}\u2009W more than usual: check the vacuum, the heaters and the leads.` }
  }
  if (litresPerHour < band.lowLitresPerHour) {
    return { status: 'low', why: `${name} boils off ${rateText(litresPerHour)}, under ${usual}; too little can mean a blocked vent or ice, or a stuck gauge: follow the local procedure and check the vent first.` }
  }
  return { status: 'usual', why: `${name} boils off ${rateText(litresPerHour)}, within ${usual}.` }
}

/**
 * Says what a falling level means in a closed volume, where cold vapour fills the space the liquid gives up, so that the
 * gas meter sees less than the level lost.
 *
 * @param litresPerHour Fall of the level, L/h.
 * @returns One sentence: the heat that explains the fall, and the gas that leaves.
 */
export function closedVolumeRemark(litresPerHour: number): string {
  const out = litresPerHour * OUTGOING_GAS_SHARE
  return `A level falling by ${rateText(litresPerHour)} takes about ${heatLoadW(litresPerHour).toPrecision(2)}\u2009W; where cold vapour fills the space left, gas worth only ${rateText(out)} of liquid leaves (the level falls by 1.62\u2009L/h for each 1.40\u2009L/h that leaves as gas).`
}
