import type { HeatCapacityUnit, TemperatureUnit } from '#shared/units/heat-capacity-units'
import { parseHeatCapacityUnit, parseTemperatureUnit, plainUnitText } from '#shared/units/heat-capacity-units'

/** What a column holds, as far as its head says. */
export type ColumnHead
  = | { readonly quantity: 'temperature', readonly unit?: TemperatureUnit }
    | { readonly quantity: 'heatCapacity', readonly unit?: HeatCapacityUnit }
    | { readonly quantity: 'sigma', readonly unit?: HeatCapacityUnit | '%' }
    | { readonly quantity: 'unknown' }

type KnownQuantity = Exclude<ColumnHead['quantity'], 'unknown'>

/**
 * Reads a column head in the quantity/unit style (`T/K`, `C/(mJ/(mol K))`, `σ(C)/…`), the bracket style (`T (K)`,
 * `sigma C [mJ/(mol K)]`), or the plain styles `T_K`, `C_J_per_mol_K` and `Cp J/(mol K)`.
 * Source of the first style: IUPAC, Quantities, Units and Symbols in Physical Chemistry (Green Book), 3rd ed., 1.1.
 *
 * @param head as it stands in the file
 * @returns quantity and unit; the unit is absent when the head does not say it, `unknown` when it is none of ours
 */
export function readColumnHead(head: string): ColumnHead {
  const text = plainUnitText(head.replace(/^\uFEFF/, '')).replace(/\s+/g, ' ')
  for (const [symbol, unitText] of splits(text)) {
    const quantity = quantityOf(symbol)
    const withUnit = quantity && readUnit(quantity, unitText)
    if (withUnit) return withUnit
  }
  const quantity = quantityOf(text)
  return quantity ? { quantity } : { quantity: 'unknown' }
}

function readUnit(quantity: KnownQuantity, unitText: string): ColumnHead | undefined {
  if (quantity === 'temperature') {
    const unit = parseTemperatureUnit(unitText)
    return unit && { quantity, unit }
  }
  if (quantity === 'sigma' && /^(%|per ?cent)$/.test(unitText)) return { quantity, unit: '%' }
  const unit = parseHeatCapacityUnit(unitText)
  if (!unit) return undefined
  return quantity === 'sigma' ? { quantity, unit } : { quantity, unit }
}

/** Every way to cut a head into a symbol and what may be its unit, the surest first. */
function* splits(text: string): Generator<[symbol: string, unit: string]> {
  const bracket = openingOfLastBracket(text)
  if (bracket > 0) {
    yield [text.slice(0, bracket), text.slice(bracket + 1, -1)]
    // `C / (mJ/(mol K))`: the bracket belongs to the unit of the quantity/unit style.
    const slash = /^(.*)\/\s*$/.exec(text.slice(0, bracket))
    if (slash) yield [slash[1]!, text.slice(bracket + 1, -1)]
  }
  for (const mark of ['/', ',', '_', ' ']) {
    for (let at = text.indexOf(mark); at > 0; at = text.indexOf(mark, at + 1)) {
      const unit = text.slice(at + 1).trim()
      yield [text.slice(0, at), /^in (.*)$/.exec(unit)?.[1] ?? unit]
    }
  }
}

/** Where the bracket that ends the text opens, or −1. */
function openingOfLastBracket(text: string): number {
  const pairs: Readonly<Record<string, string>> = { ')': '(', ']': '[' }
  const closing = text.at(-1) ?? ''
  const opening = pairs[closing]
  if (!opening) return -1
  let depth = 0
  for (let at = text.length - 1; at >= 0; at -= 1) {
    if (text[at] === closing) depth += 1
    else if (text[at] === opening) depth -= 1
    if (depth === 0) return at
  }
  return -1
}

const TEMPERATURE = /^(sample)?(t|temp|temperature)(sample|s|avg|mean|average)?$/
const HEAT_CAPACITY = /^(sample|samp|molar|total|addenda)?(c(p|v|s|pm|m|tot|mol|sample|sigma)?|hc|heatcapacity|specificheat|specificheatcapacity|molarheatcapacity)(sample|molar|total|addenda)?$/
const SPREAD = /^(standarduncertainty|standarderror|uncertainty|unc|stderr|stdev|std|error|err|sigma|σ|delta|δ|d|u|s|\+-|±)(of|in)?/
const SPREAD_AFTER = /(err|error|std|stderr|stdev|unc|uncertainty|sigma|standarderror|standarduncertainty)$/

function quantityOf(symbol: string): KnownQuantity | undefined {
  const name = symbol.toLowerCase().replace(/[\s_().,{}[\]:"'-]/g, '')
  if (TEMPERATURE.test(name)) return 'temperature'
  const spread = SPREAD.exec(name)?.[0]
  const about = spread ? name.slice(spread.length) : SPREAD_AFTER.test(name) ? name.replace(SPREAD_AFTER, '') : undefined
  if (about !== undefined && (HEAT_CAPACITY.test(about) || (about === '' && name.length > 1) || name === 'σ')) return 'sigma'
  return HEAT_CAPACITY.test(name) ? 'heatCapacity' : undefined
}
