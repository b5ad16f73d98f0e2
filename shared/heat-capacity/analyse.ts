import { DomainError } from '#shared/errors'
import type { Addenda } from '#shared/heat-capacity/addenda'
import { subtractAddenda } from '#shared/heat-capacity/addenda'
import type { CheckContext } from '#shared/heat-capacity/checks/context'
import { runChecks } from '#shared/heat-capacity/checks/index'
import { thresholdsWith } from '#shared/heat-capacity/checks/thresholds'
import type { StandardReading } from '#shared/heat-capacity/copper-standard'
import { ENGINE_VERSION } from '#shared/heat-capacity/engine-version'
import { fitLowTemperature, withMassUncertainty } from '#shared/heat-capacity/fit'
import { scaledCurve, suggestCorrections } from '#shared/heat-capacity/suggestions'
import type { FitModel, FitWeights, HeatCapacityAnalysis, HeatCapacityCurve, HeatCapacitySample, LowTemperatureFit } from '#shared/heat-capacity/types'
import { verdictOf } from '#shared/heat-capacity/verdict'
import { handbookEntry } from '#shared/materials/elements'

/** What an analysis rests on. */
export interface AnalysisInput {
  /** As measured, addenda still in it, mJ/(mol K). */
  readonly curve: HeatCapacityCurve
  readonly sample: HeatCapacitySample
  readonly model: FitModel
  /** Stated σ where there is one, else relative, when left out. */
  readonly weights?: FitWeights
  readonly addenda?: Addenda
  /** Limits that the facility has tuned, by name; only those that differ. */
  readonly thresholds?: Readonly<Record<string, number>>
  /** The last copper reading of the cryostat. */
  readonly standard?: StandardReading
  /** Whether the table is per whole sample (J/K), so that a wrong mass is a likely slip. */
  readonly massEntersConversion?: boolean
}

/**
 * Fits a heat-capacity curve, runs every check and names likely slips: the one engine of server, browser and command line.
 *
 * @param input curve, sample, model; addenda, tuned limits and copper reading where there are any
 * @returns fit (indices count in the curve given), checks, verdict, suggestions
 * @throws DomainError when the window does not allow the fit, or the addenda do not cover it
 */
export function analyseHeatCapacity(input: AnalysisInput): HeatCapacityAnalysis {
  const { context, indices } = look(input, input.curve)
  const checks = runChecks(context)
  const suggestions = suggestCorrections({
    context, checks, massEntersConversion: input.massEntersConversion ?? false,
    contextWith: factor => lookIfPossible(input, scaledCurve(input.curve, factor)),
  })
  const fit = indices ? { ...context.reported, usedIndices: context.reported.usedIndices.map(index => indices[index]!) } : context.reported
  return { engineVersion: ENGINE_VERSION, fit, checks, verdict: verdictOf(checks), suggestions }
}

/** The checks' view of a measured curve, and where its points stand in that curve when addenda left some out. */
function look({ sample, model, weights, addenda, thresholds, standard }: AnalysisInput, total: HeatCapacityCurve): { context: CheckContext, indices?: readonly number[] } {
  const net = addenda && subtractAddenda(total, addenda, model.windowK)
  const curve = net?.curve ?? total
  const options = { atomsPerFormulaUnit: sample.atomsPerFormulaUnit, weights }
  const fit = fitLowTemperature(curve, model, options)
  return {
    indices: net?.indices,
    context: {
      curve, sample, fit, standard,
      addenda: net,
      reported: withMassOf(sample, fit),
      thresholds: thresholdsWith(thresholds),
      handbook: handbookEntry(sample.formula),
      refit: terms => fitLowTemperature(curve, { terms, windowK: model.windowK }, options),
    },
  }
}

function lookIfPossible(input: AnalysisInput, total: HeatCapacityCurve): CheckContext | undefined {
  try {
    return look(input, total).context
  }
  catch (error) {
    if (error instanceof DomainError) return undefined
    throw error
  }
}

function withMassOf({ massMg, massUncertaintyMg }: HeatCapacitySample, fit: LowTemperatureFit): LowTemperatureFit {
  return massMg !== undefined && massUncertaintyMg !== undefined ? withMassUncertainty(fit, massUncertaintyMg / massMg) : fit
}
