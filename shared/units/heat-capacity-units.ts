import { DomainError } from '#shared/errors'

/** Energies a heat capacity may be stated in, with millijoules in each. The calorie is the thermochemical one, 4.184 J by definition. */
const MILLIJOULES = { J: 1000, mJ: 1, µJ: 1e-3, cal: 4184 } as const

/** Amounts a heat capacity may be stated per; `total` is the whole sample, J/K. */
const AMOUNTS = { mol: 'mol', gAtom: 'g-atom', g: 'g', kg: 'kg', cm3: 'cm³', total: '' } as const

type Energy = keyof typeof MILLIJOULES
type Amount = keyof typeof AMOUNTS
type PerAmount<E extends string> = `${E}/(mol K)` | `${E}/(g-atom K)` | `${E}/(g K)` | `${E}/(kg K)` | `${E}/(cm³ K)` | `${E}/K`

/** A unit of heat capacity as it is shown and stored; `mol` means mole of formula units. */
export type HeatCapacityUnit = PerAmount<Energy>

/** A unit of temperature. */
export type TemperatureUnit = 'K' | 'mK'

interface UnitParts { readonly energy: Energy, readonly amount: Amount }

const PARTS: ReadonlyMap<string, UnitParts> = new Map((Object.keys(MILLIJOULES) as Energy[]).flatMap(energy =>
  (Object.keys(AMOUNTS) as Amount[]).map(amount => [unitName(energy, amount), { energy, amount }] as const)))

function unitName(energy: Energy, amount: Amount): HeatCapacityUnit {
  return (amount === 'total' ? `${energy}/K` : `${energy}/(${AMOUNTS[amount]} K)`) as HeatCapacityUnit
}

/** Every unit of heat capacity that can be read, the commonest first. */
export const HEAT_CAPACITY_UNITS = [...PARTS.keys()] as [HeatCapacityUnit, ...HeatCapacityUnit[]]

/** Every unit of temperature that can be read. */
export const TEMPERATURE_UNITS = ['K', 'mK'] as const satisfies readonly TemperatureUnit[]

/** What a conversion may need to know of the sample. */
export interface ConversionFacts {
  readonly molarMassGPerMol: number
  readonly atomsPerFormulaUnit: number
  readonly massMg?: number
  readonly densityGPerCm3?: number
}

/** A factor to mJ/(mol K), and the sample facts that it rests on, in words. */
export interface HeatCapacityConversion {
  readonly factor: number
  /** E.g. `molar mass 63.546 g/mol`; empty when the unit is per mole already. */
  readonly uses: readonly string[]
}

/**
 * The factor that turns a heat capacity into mJ per mole of formula units and kelvin, with the facts it used.
 *
 * @param unit unit of the numbers
 * @param facts molar mass (g/mol), atoms per formula unit, and mass (mg) or density (g/cm³) where the unit needs them
 * @returns factor and what it used
 * @throws DomainError when the sample's mass or density is needed and missing
 * @example heatCapacityConversion('J/(g K)', { molarMassGPerMol: 63.546, atomsPerFormulaUnit: 1 }).factor // 63546
 */
export function heatCapacityConversion(unit: HeatCapacityUnit, facts: ConversionFacts): HeatCapacityConversion {
  const parts = PARTS.get(unit)
  if (!parts) throw new DomainError('invalid', `“${unit}” is no unit of heat capacity that can be read. Choose one of the list, such as mJ/(mol K).`, ['unit'])
  const millijoules = MILLIJOULES[parts.energy]
  const molarMass = facts.molarMassGPerMol
  const molarMassWords = `molar mass ${plain(molarMass)} g/mol`
  switch (parts.amount) {
    case 'mol': return { factor: millijoules, uses: [] }
    case 'gAtom': return { factor: millijoules * facts.atomsPerFormulaUnit, uses: [`${plain(facts.atomsPerFormulaUnit)} atoms per formula unit`] }
    case 'g': return { factor: millijoules * molarMass, uses: [molarMassWords] }
    case 'kg': return { factor: millijoules * molarMass / 1000, uses: [molarMassWords] }
    case 'cm3': {
      const density = needed(facts.densityGPerCm3, 'densityGPerCm3', `The table is in ${unit}, so the density of the sample is needed. Enter the density in g/cm³, or choose a unit per mole.`)
      return { factor: millijoules * molarMass / density, uses: [molarMassWords, `density ${plain(density)} g/cm³`] }
    }
    case 'total': {
      const massMg = needed(facts.massMg, 'massMg', `The table is in ${unit}, the whole sample, so its mass is needed. Enter the mass of the sample, or choose a unit per mole.`)
      return { factor: millijoules * molarMass * 1000 / massMg, uses: [molarMassWords, `mass ${plain(massMg)} mg`] }
    }
  }
}

/**
 * Whether a unit is of the whole sample (J/K and the like), as addenda are.
 *
 * @param unit unit of heat capacity
 */
export function isTotalUnit(unit: HeatCapacityUnit): boolean {
  return PARTS.get(unit)?.amount === 'total'
}

/**
 * Converts one heat capacity into mJ/(mol K).
 *
 * @param value number in `unit`
 * @param unit its unit
 * @param facts sample facts, see `heatCapacityConversion`
 * @returns mJ/(mol K)
 * @throws DomainError when a needed fact is missing
 */
export function toMillijoulePerMolK(value: number, unit: HeatCapacityUnit, facts: ConversionFacts): number {
  return value * heatCapacityConversion(unit, facts).factor
}

/**
 * Converts one heat capacity from mJ/(mol K) into another unit, the inverse of `toMillijoulePerMolK`.
 *
 * @param value mJ/(mol K)
 * @param unit unit wanted
 * @param facts sample facts, see `heatCapacityConversion`
 * @returns number in `unit`
 * @throws DomainError when a needed fact is missing
 */
export function fromMillijoulePerMolK(value: number, unit: HeatCapacityUnit, facts: ConversionFacts): number {
  return value / heatCapacityConversion(unit, facts).factor
}

/**
 * Factor that turns a temperature into kelvin.
 *
 * @param unit K or mK
 */
export function kelvinPer(unit: TemperatureUnit): number {
  return unit === 'mK' ? 1e-3 : 1
}

/** Spellings of amounts that stand for one of ours, longest first so that `g-atom` is not read as `g`. */
const AMOUNT_SPELLINGS: readonly (readonly [RegExp, string])[] = [
  [/g[\s_-]?at(?:oms?)?\b|mol[\s_-]?(?:of[\s_-])?atoms?\b/gi, 'gatom'],
  [/mol(?:e)?[\s_.-]?(?:f\.?u\.?|formula units?)|f\.u\.|\bfu\b|\bmoles?\b/gi, 'mol'],
]

/**
 * Plain form of a unit as typed: superscripts as `^-1`, one micro sign, one minus, no dots between factors.
 *
 * @param text as it stands in a column head
 */
export function plainUnitText(text: string): string {
  const superscripts = '⁰¹²³⁴⁵⁶⁷⁸⁹'
  return text.replace(/[\u03bc\u00b5]/g, 'µ').replace(/[−–‐‑]/g, '-')
    .replace(/⁻?[⁰¹²³⁴⁵⁶⁷⁸⁹]/g, power => `^${power.startsWith('⁻') ? '-' : ''}${superscripts.indexOf(power.at(-1)!)}`)
    .replace(/[·⋅∙×*]/g, ' ').replace(/\u00a0|\u2009|\u202f/g, ' ').trim()
}

/**
 * Reads a unit of heat capacity in any usual spelling: `mJ/(mol K)`, `mJ/mol/K`, `mJ/mol-K`, `mJ mol^-1 K^-1`, `J_per_mol_K`.
 *
 * @param text unit as typed
 * @returns the unit, or undefined when it is none
 */
export function parseHeatCapacityUnit(text: string): HeatCapacityUnit | undefined {
  let rest = plainUnitText(text).replace(/^\[(.*)\]$/, '$1').replace(/^\((.*)\)$/, '$1')
  const energy = /^(mJ|µJ|uJ|J|cal)(?![a-zA-Z])/.exec(rest)?.[1]
  if (!energy) return undefined
  rest = rest.slice(energy.length)
  for (const [spelling, plainName] of AMOUNT_SPELLINGS) rest = rest.replace(spelling, plainName)
  const amounts: Amount[] = []
  let kelvins = 0
  let negativePowers = 0
  let factors = 0
  const leftOver = rest.replace(/_/g, ' ').replace(/(gatom|mol|kg|g|cm(?:\^?3|\^-3|-3)|cc|K)(\^?-1)?(?![a-zA-Z0-9^])/g, (_, name: string, power?: string) => {
    factors += 1
    if (power || /-3$/.test(name)) negativePowers += 1
    if (name === 'K') kelvins += 1
    else amounts.push(name === 'gatom' ? 'gAtom' : name.startsWith('c') ? 'cm3' : name as Amount)
    return ' '
  })
  const divided = /\/|\bper\b/.test(leftOver)
  if (kelvins !== 1 || amounts.length > 1 || (divided ? negativePowers > 0 : negativePowers !== factors)) return undefined
  if (!/^[\s/().-]*$/.test(leftOver.replace(/\bper\b/g, ' '))) return undefined
  return unitName(energy === 'uJ' ? 'µJ' : energy as Energy, amounts[0] ?? 'total')
}

/**
 * Reads a unit of temperature.
 *
 * @param text unit as typed
 * @returns K, mK, or undefined when it is neither
 */
export function parseTemperatureUnit(text: string): TemperatureUnit | undefined {
  const plainText = plainUnitText(text)
  if (/^(K|kelvins?)$/i.test(plainText)) return 'K'
  return /^(mK|millikelvins?)$/.test(plainText) ? 'mK' : undefined
}

function needed(value: number | undefined, field: string, sentence: string): number {
  if (value === undefined || !(value > 0 && Number.isFinite(value))) throw new DomainError('invalid', sentence, [field])
  return value
}

/** Six figures without trailing zeros, for sentences. */
function plain(value: number): string {
  return String(Number(value.toPrecision(6)))
}
