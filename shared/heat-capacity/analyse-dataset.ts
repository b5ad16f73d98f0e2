import { addendaPerMole } from '#shared/heat-capacity/addenda-amount'
import { analyseHeatCapacity } from '#shared/heat-capacity/analyse'
import type { StandardReading } from '#shared/heat-capacity/copper-standard'
import { scaledCurve } from '#shared/heat-capacity/suggestions'
import type { CorrectionSuggestion, FitModel, HeatCapacityAnalysis, HeatCapacityCurve, HeatCapacitySample } from '#shared/heat-capacity/types'
import { type HeatCapacityUnit, isTotalUnit } from '#shared/units/heat-capacity-units'

/** A stored dataset and what a person chose for its analysis. */
export interface DatasetAnalysisInput {
  /** As mapped, mJ/(mol K). */
  readonly curve: HeatCapacityCurve
  readonly sample: HeatCapacitySample
  readonly model: FitModel
  /** Unit of the heat capacities in the file. */
  readonly unit: HeatCapacityUnit
  /** Addenda of the whole holder, mJ/K. */
  readonly holder?: HeatCapacityCurve
  /** The conversion that was accepted; it multiplies the measured curve, not the addenda. */
  readonly correction?: CorrectionSuggestion | null
  readonly standard?: StandardReading
  readonly thresholds: Readonly<Record<string, number>>
}

/**
 * Analyses a stored dataset: the browser while a person tries windows, the server when it is saved.
 *
 * @param input the dataset and the choices
 * @returns the analysis; indices count in the curve given
 * @throws DomainError when the window does not allow the fit, or the addenda cannot be taken off
 */
export function analyseDataset(input: DatasetAnalysisInput): HeatCapacityAnalysis {
  const { sample, model, unit, holder, standard, thresholds } = input
  return analyseHeatCapacity({
    curve: correctedCurve(input),
    sample,
    model,
    standard,
    thresholds,
    addenda: holder && { kind: 'table', curve: addendaPerMole(holder, sample) },
    massEntersConversion: isTotalUnit(unit),
  })
}

/** The measured curve with the accepted conversion in it. */
export function correctedCurve({ curve, correction }: Pick<DatasetAnalysisInput, 'curve' | 'correction'>): HeatCapacityCurve {
  return correction ? scaledCurve(curve, correction.factor) : curve
}
