import { DomainError } from '#shared/errors'
import { gasLitresPerLiquidLitre } from '#shared/helium/properties'
import type { CryogenicFluid } from '#shared/helium/properties'

/** Oxygen in ordinary air, percent by volume; 20.9 and 21 are in use too and decide near an alarm level, so it is stated. */
export const ORDINARY_OXYGEN_PERCENT = 20.95

/** Room temperature at which released gas is counted, K (20 °C). */
const ROOM_TEMPERATURE_K = 293.15

/**
 * Oxygen levels at which facilities usually act, percent. 19.5: lower limit of ordinary work (OSHA 29 CFR 1910.146; BCGA),
 * 18: evacuation in several codes. Local codes decide.
 */
export const OXYGEN_LEVELS_PERCENT = { alarm: 19.5, evacuate: 18 } as const

/** Which usual level the estimate falls under. */
export type OxygenLevel = 'under-18' | 'under-19.5' | 'above-19.5'

/** An oxygen estimate with the model it rests on. */
export interface OxygenEstimate {
  /** Oxygen by the model used, percent by volume. */
  readonly oxygenPercent: number
  readonly level: OxygenLevel
  /** Sentences: result, model, limits, deference. */
  readonly text: string
}

/** Estimate of an instant release, by three models from the most to the least pessimistic. */
export interface InstantReleaseEstimate extends OxygenEstimate {
  /** Gas released, m³ at 20 °C (or the given temperature) and 101.325 kPa. */
  readonly gasM3: number
  /** Gas pushes only air out: O₂·(V − V_gas)/V. The one used. */
  readonly displacementPercent: number
  /** Well mixed while it overflows: O₂·exp(−V_gas/V). */
  readonly mixedOverflowPercent: number
  /** Mixed once, the excess leaves: O₂·V/(V + V_gas). */
  readonly mixedOncePercent: number
}

/** What the words of every estimate end with. */
const DEFERENCE = 'It does not replace an assessment under local codes by licensed people, nor a working oxygen alarm.'

const WHERE: Readonly<Record<CryogenicFluid, string>> = {
  helium: 'Helium gathers under the ceiling, where there is less oxygen than this mean',
  nitrogen: 'Cold nitrogen gathers at the floor and in pits, where there is less oxygen than this mean',
}

function levelOf(oxygenPercent: number): OxygenLevel {
  if (oxygenPercent < OXYGEN_LEVELS_PERCENT.evacuate) return 'under-18'
  return oxygenPercent < OXYGEN_LEVELS_PERCENT.alarm ? 'under-19.5' : 'above-19.5'
}

function levelWords(level: OxygenLevel): string {
  if (level === 'under-18') return 'under 18\u2009%, at which several codes call for evacuation'
  if (level === 'under-19.5') return 'under 19.5\u2009%, the usual alarm level'
  return 'not under the usual alarm level of 19.5\u2009% in this model, which leaves out what is named next'
}

function positive(value: number, path: string, sentence: string): void {
  if (!(value > 0 && Number.isFinite(value))) throw new DomainError('invalid', sentence, [path])
}

/**
 * Oxygen left in a closed room after all of a vessel's liquid turned to gas at once.
 *
 * @param release Room volume in m³, liquid in litres, which fluid; gas temperature in K and oxygen of the air in percent where they differ from 20 °C and 20.95 %.
 * @returns Oxygen by three models, the most pessimistic (displacement) used, with words on model and limits.
 * @throws DomainError when a volume is not above zero or the oxygen is not a percentage up to 21.
 * Source: displacement as in the cryogenic calculator of the University of Nottingham; exponential and single mixing from the mass balance.
 */
export function oxygenAfterRelease(release: {
  readonly roomM3: number
  readonly liquidL: number
  readonly fluid: CryogenicFluid
  readonly gasTemperatureK?: number
  readonly initialOxygenPercent?: number
}): InstantReleaseEstimate {
  const { roomM3, liquidL, fluid, gasTemperatureK = ROOM_TEMPERATURE_K, initialOxygenPercent = ORDINARY_OXYGEN_PERCENT } = release
  positive(roomM3, 'roomM3', 'The volume of the room must be above zero. Enter it in cubic metres.')
  if (!(liquidL >= 0 && Number.isFinite(liquidL))) throw new DomainError('invalid', 'The liquid released must be zero or more. Enter it in litres.', ['liquidL'])
  checkOxygen(initialOxygenPercent)
  const gasM3 = liquidL * gasLitresPerLiquidLitre(gasTemperatureK, fluid) / 1000
  const displacementPercent = initialOxygenPercent * Math.max(0, roomM3 - gasM3) / roomM3
  const level = levelOf(displacementPercent)
  return {
    gasM3,
    displacementPercent,
    mixedOverflowPercent: initialOxygenPercent * Math.exp(-gasM3 / roomM3),
    mixedOncePercent: initialOxygenPercent * roomM3 / (roomM3 + gasM3),
    oxygenPercent: displacementPercent,
    level,
    text: `${displacementPercent.toFixed(1)}\u2009% oxygen: ${levelWords(level)}. Model: all ${liquidL}\u2009L of liquid ${fluid} become ${gasM3.toFixed(1)}\u2009m³ of gas at once and push only air out of a closed room of ${roomM3}\u2009m³, starting from ${initialOxygenPercent}\u2009%. Limits: no ventilation, one mean for the whole room. ${WHERE[fluid]}. ${DEFERENCE}`,
  }
}

/** A release into a ventilated room. */
export interface VentilatedRelease {
  readonly roomM3: number
  /** Gas released, m³/h at room temperature. */
  readonly releaseM3PerHour: number
  /** Ventilation, m³/h, zero or more. */
  readonly ventilationM3PerHour: number
  /** Whether the fan blows fresh air in or draws room air out. */
  readonly fan: 'blows-in' | 'draws-out'
  /** Hours since the release began; Infinity for what it settles at. */
  readonly hours: number
  readonly fluid: CryogenicFluid
  readonly initialOxygenPercent?: number
}

/**
 * Oxygen in a ventilated room during a steady release, with the room's air well mixed.
 *
 * @param release Volumes in m³ and m³/h, which way the fan moves air, and hours.
 * @returns Oxygen with words on model and limits.
 * @throws DomainError when a volume, flow or time cannot be.
 * Source: Fermilab ES&H Manual chapter 4240, section 6.1.A, cases A to C.
 */
export function oxygenDuringRelease(release: VentilatedRelease): OxygenEstimate {
  const { roomM3, releaseM3PerHour: R, ventilationM3PerHour: Q, fan, hours, fluid, initialOxygenPercent = ORDINARY_OXYGEN_PERCENT } = release
  positive(roomM3, 'roomM3', 'The volume of the room must be above zero. Enter it in cubic metres.')
  positive(R, 'releaseM3PerHour', 'The release must be above zero. Enter it in cubic metres of gas an hour.')
  if (!(Q >= 0 && Number.isFinite(Q))) throw new DomainError('invalid', 'The ventilation must be zero or more. Enter it in cubic metres an hour.', ['ventilationM3PerHour'])
  if (!(hours >= 0)) throw new DomainError('invalid', 'The time since the release began must be zero or more. Enter it in hours.', ['hours'])
  checkOxygen(initialOxygenPercent)
  const left = (rate: number): number => rate === 0 ? 1 : Math.exp(-rate * hours / roomM3)
  let share: number
  if (fan === 'blows-in') share = (Q + R * left(Q + R)) / (Q + R)
  else if (Q <= R) share = left(R)
  else share = 1 - R / Q * (1 - left(Q))
  const oxygenPercent = initialOxygenPercent * share
  const level = levelOf(oxygenPercent)
  const when = Number.isFinite(hours) ? `after ${Number(hours.toFixed(2))}\u2009h` : 'in the long run'
  const moves = fan === 'blows-in' ? 'blowing fresh air in' : 'drawing room air out'
  return {
    oxygenPercent,
    level,
    text: `${oxygenPercent.toFixed(1)}\u2009% oxygen ${when}: ${levelWords(level)}. Model: ${R}\u2009m³ of ${fluid} gas an hour mixes at once with the air of ${roomM3}\u2009m³, a fan ${moves} at ${Q}\u2009m³ an hour, starting from ${initialOxygenPercent}\u2009%. Limits: steady release, a fan that runs, one mean for the whole room. ${WHERE[fluid]}. ${DEFERENCE}`,
  }
}

function checkOxygen(initialOxygenPercent: number): void {
  if (!(initialOxygenPercent > 0 && initialOxygenPercent <= 21)) {
    throw new DomainError('invalid', 'The oxygen of the air is a percentage above 0 and up to 21. Enter 20.95 for ordinary air.', ['initialOxygenPercent'])
  }
}
