import { DomainError } from '#shared/errors'
import type { Addenda } from '#shared/heat-capacity/addenda'
import { analyseHeatCapacity } from '#shared/heat-capacity/analyse'
import type { MappedTable } from '#shared/heat-capacity/apply-mapping'
import { applyMapping, mappingFromHeads } from '#shared/heat-capacity/apply-mapping'
import type { Table } from '#shared/heat-capacity/read-table'
import type { HeatCapacityReport } from '#shared/heat-capacity/report-json'
import { heatCapacityReport } from '#shared/heat-capacity/report-json'
import { parseFormula } from '#shared/heat-capacity/sample'
import type { FitTerm, HeatCapacityCurve, HeatCapacitySample } from '#shared/heat-capacity/types'
import { adviseWindow } from '#shared/heat-capacity/window-advice'
import type { AnalysisSampleInput, ColumnMapping } from '#shared/schemas/heat-capacity'
import { isTotalUnit } from '#shared/units/heat-capacity-units'

/** A table with its mapping, where the heads do not say it. */
export interface TableInput { readonly table: Table, readonly mapping?: ColumnMapping }

/** What a check of one table rests on. */
export interface TableCheckInput {
  readonly table: TableInput
  readonly sample: AnalysisSampleInput
  /** γT + β₃T³ when left out. */
  readonly terms?: readonly FitTerm[]
  /** Chosen by the advice when left out. */
  readonly windowK?: readonly [number, number]
  readonly addenda?: TableInput
  readonly restoredRows?: readonly number[]
  readonly thresholds?: Readonly<Record<string, number>>
}

/**
 * Reads, fits and checks one table without storing anything: what the command line and `POST /api/heat-capacity/check` do.
 *
 * @param input table, sample, and what differs from the defaults
 * @returns the report as JSON
 * @throws DomainError when formula, columns, units, window or addenda do not allow it
 */
export function checkTable(input: TableCheckInput): HeatCapacityReport {
  const sample: HeatCapacitySample = { ...input.sample, ...parseFormula(input.sample.formula) }
  const measured = mapped(input.table, sample, input.restoredRows)
  const addenda = input.addenda && ({ kind: 'table', curve: mapped(input.addenda, sample).curve } satisfies Addenda)
  const choice = chooseModel(input, measured.curve, sample)
  const analysis = analyseHeatCapacity({
    curve: measured.curve, sample, addenda, thresholds: input.thresholds,
    model: { terms: choice.terms, windowK: choice.windowK },
    massEntersConversion: measured.massEntersConversion,
  })
  return heatCapacityReport({ analysis, sample, window: { chosenBy: choice.chosenBy, reason: choice.reason }, conversionUses: measured.conversionUses, rejectedRows: measured.rejectedRows })
}

function mapped({ table, mapping: given }: TableInput, sample: HeatCapacitySample, restoredRows?: readonly number[]): MappedTable & { massEntersConversion: boolean } {
  const mapping = given ?? mappingFromHeads(table)
  return { ...applyMapping(table, mapping, sample, restoredRows), massEntersConversion: isTotalUnit(mapping.heatCapacity.unit) }
}

interface Choice { readonly terms: readonly FitTerm[], readonly windowK: readonly [number, number], readonly chosenBy: HeatCapacityReport['window']['chosenBy'], readonly reason: string | null }

function chooseModel({ terms: given, windowK }: TableCheckInput, curve: HeatCapacityCurve, sample: HeatCapacitySample): Choice {
  const terms = given ?? ['gamma', 'beta3']
  if (windowK) return { terms, windowK, chosenBy: 'given', reason: null }
  const whole: Choice = { terms, windowK: [curve.temperatureK[0]!, curve.temperatureK[curve.temperatureK.length - 1]!], chosenBy: 'whole-range', reason: 'The points are too few for an advice, so all of them are used.' }
  try {
    const aboveTransition = sample.kind === 'superconductor' ? sample.criticalTemperatureK : undefined
    const advice = adviseWindow(curve, { atomsPerFormulaUnit: sample.atomsPerFormulaUnit, terms, lowK: aboveTransition, offerBeta5: given === undefined })
    return { terms: given ?? advice.terms, windowK: advice.windowK, chosenBy: 'advice', reason: advice.reason }
  }
  catch (error) {
    if (error instanceof DomainError) return whole
    throw error
  }
}
