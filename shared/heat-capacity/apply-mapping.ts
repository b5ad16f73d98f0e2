import { DomainError } from '#shared/errors'
import type { Table } from '#shared/heat-capacity/read-table'
import type { HeatCapacityCurve } from '#shared/heat-capacity/types'
import type { ColumnMapping } from '#shared/schemas/heat-capacity'
import type { RejectedRow } from '#shared/types/results'
import type { ConversionFacts } from '#shared/units/heat-capacity-units'
import { heatCapacityConversion, kelvinPer } from '#shared/units/heat-capacity-units'

/** A table with its columns understood. */
export interface MappedTable {
  /** Sorted by rising temperature, with the line of the file of each point. */
  readonly curve: HeatCapacityCurve
  /** Rows left out, and rows that were left out and put back, in the order of the file. */
  readonly rejectedRows: readonly RejectedRow[]
  /** Temperatures that were measured more than once, K, with their lines; all of them are kept. */
  readonly repeats: readonly { readonly temperatureK: number, readonly rows: readonly number[] }[]
  /** Sample facts that the conversion of units rests on. */
  readonly conversionUses: readonly string[]
}

/**
 * Turns a table into a curve in mJ/(mol K). Rows that cannot stand in it are left out, each with its reason; nothing is mended silently.
 *
 * @param table as read
 * @param mapping columns and their units
 * @param facts sample facts that the conversion needs
 * @param restoredRows lines of the file that a person puts back; only rows that hold numbers can be
 * @returns curve, rows left out, repeats, and what the conversion used
 * @throws DomainError when a column is not there, a needed sample fact is missing, or no row can be used
 */
export function applyMapping(table: Table, mapping: ColumnMapping, facts: ConversionFacts, restoredRows: readonly number[] = []): MappedTable {
  const read = createRowReader(table, mapping, facts)
  const restored = new Set(restoredRows)
  const rejectedRows: RejectedRow[] = []
  const kept: number[] = []
  for (let row = 0; row < table.rowCount; row += 1) {
    const fault = read.faultOf(row)
    if (!fault) {
      kept.push(row)
      continue
    }
    const line = table.rowNumbers[row]!
    const backAgain = fault.restorable && restored.has(line)
    if (backAgain) kept.push(row)
    rejectedRows.push({ row: line, column: fault.column, reason: fault.reason, restorable: fault.restorable, restored: backAgain })
  }
  if (kept.length === 0) {
    const first = rejectedRows[0]
    throw new DomainError('invalid', first
      ? `No row of the table can be used. The first, row ${first.row}: ${first.reason} Check the columns and the decimal marks.`
      : 'The table has heads but no rows. Choose the file with the measured points.', ['file'])
  }
  kept.sort((a, b) => read.temperatureK(a) - read.temperatureK(b) || a - b)
  const curve: HeatCapacityCurve = {
    temperatureK: kept.map(read.temperatureK),
    heatCapacity: kept.map(read.heatCapacity),
    ...(mapping.sigma ? { sigma: kept.map(read.sigma) } : {}),
    rowNumbers: kept.map(row => table.rowNumbers[row]!),
  }
  return { curve, rejectedRows, repeats: repeatsOf(curve), conversionUses: read.uses }
}

interface Fault { readonly column?: string, readonly reason: string, readonly restorable: boolean }

function createRowReader(table: Table, mapping: ColumnMapping, facts: ConversionFacts) {
  const width = table.columns.length
  const columnAt = (index: number, label: string) => {
    const column = table.columns[index]
    if (!column) throw new DomainError('invalid', `The table has ${width} columns; there is no column ${index + 1} for ${label}. Choose the columns anew.`, ['mapping', label])
    return column
  }
  const temperatures = columnAt(mapping.temperature.column, 'temperature')
  const heatCapacities = columnAt(mapping.heatCapacity.column, 'heatCapacity')
  const sigmas = mapping.sigma && columnAt(mapping.sigma.column, 'sigma')
  const kelvins = kelvinPer(mapping.temperature.unit)
  const conversion = heatCapacityConversion(mapping.heatCapacity.unit, facts)
  const sigmaUnit = mapping.sigma?.unit
  const sigmaFactor = sigmaUnit && sigmaUnit !== '%' ? heatCapacityConversion(sigmaUnit, facts).factor : 1
  const temperatureK = (row: number) => temperatures[row]! * kelvins
  const heatCapacity = (row: number) => heatCapacities[row]! * conversion.factor
  const sigma = (row: number) => sigmaUnit === '%' ? Math.abs(heatCapacity(row)) * sigmas![row]! / 100 : sigmas![row]! * sigmaFactor

  const notNumber = (row: number, column: number): Fault | undefined => {
    if (!Number.isNaN(table.columns[column]![row])) return undefined
    const text = table.texts.get(row * width + column)
    return { column: table.heads[column], reason: text === undefined ? 'The cell is empty.' : `“${text}” is no number.`, restorable: false }
  }
  const faultOf = (row: number): Fault | undefined => {
    const missing = notNumber(row, mapping.temperature.column) ?? notNumber(row, mapping.heatCapacity.column) ?? (mapping.sigma && notNumber(row, mapping.sigma.column))
    const cells = table.ragged.get(row)
    if (cells !== undefined && (missing || cells > width)) {
      return { reason: `The row has ${cells} ${cells === 1 ? 'cell' : 'cells'} where the table has ${width} columns.`, restorable: !missing }
    }
    if (missing) return missing
    if (!(temperatureK(row) > 0)) return { column: table.heads[mapping.temperature.column], reason: `The temperature ${temperatures[row]} is not above 0 K.`, restorable: false }
    if (mapping.sigma && !(sigmas![row]! > 0)) return { column: table.heads[mapping.sigma.column], reason: `The uncertainty ${sigmas![row]} is not above zero.`, restorable: false }
    if (!(heatCapacity(row) > 0)) {
      // A noisy point at the cold end may fall below zero and still carry weight, but only with an uncertainty of its own.
      return { column: table.heads[mapping.heatCapacity.column], reason: `The heat capacity ${heatCapacities[row]} is not above zero.`, restorable: mapping.sigma !== undefined && sigmaUnit !== '%' }
    }
    return undefined
  }
  return { temperatureK, heatCapacity, sigma, faultOf, uses: conversion.uses }
}

/** Neighbours of one temperature in a sorted curve. */
function repeatsOf({ temperatureK, rowNumbers }: HeatCapacityCurve): MappedTable['repeats'] {
  const repeats: { temperatureK: number, rows: number[] }[] = []
  for (let index = 1; index < temperatureK.length; index += 1) {
    if (temperatureK[index] !== temperatureK[index - 1]) continue
    const last = repeats.at(-1)
    if (last && last.temperatureK === temperatureK[index]) last.rows.push(rowNumbers![index]!)
    else repeats.push({ temperatureK: temperatureK[index]!, rows: [rowNumbers![index - 1]!, rowNumbers![index]!] })
  }
  return repeats
}

/**
 * The mapping that the heads of a table give, complete with units.
 *
 * @param table as read
 * @returns the mapping; σ without a unit of its own has that of the heat capacity
 * @throws DomainError naming the head that is missing or says no unit
 */
export function mappingFromHeads(table: Table): ColumnMapping {
  const { temperature, heatCapacity, sigma } = table.suggestedMapping
  const heads = table.headRow === undefined ? 'The table has no heads.' : `The heads are: ${table.heads.map(head => `“${head}”`).join(', ')}.`
  const missing = (what: string, example: string) => new DomainError('invalid', `No column is headed as ${what}. ${heads} Name it like ${example}, or choose the column yourself.`, ['mapping'])
  if (!temperature) throw missing('a temperature', '“T/K” or “T (K)”')
  if (!heatCapacity) throw missing('a heat capacity', '“C/(mJ/(mol K))” or “C (mJ/(mol K))”')
  const noUnit = (column: number, example: string) => new DomainError('invalid', `The head “${table.heads[column]}” says no unit that can be read. Write it like ${example}, or choose the unit yourself.`, ['mapping'])
  if (!temperature.unit) throw noUnit(temperature.column, '“T/K”')
  if (!heatCapacity.unit) throw noUnit(heatCapacity.column, '“C/(mJ/(mol K))”')
  return {
    temperature: { column: temperature.column, unit: temperature.unit },
    heatCapacity: { column: heatCapacity.column, unit: heatCapacity.unit },
    ...(sigma ? { sigma: { column: sigma.column, unit: sigma.unit ?? heatCapacity.unit } } : {}),
  }
}
