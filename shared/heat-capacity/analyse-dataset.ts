import { addendaPerMole } from '#shared/heat-capacity/addenda-amount'
import { subtractAddenda } from '#shared/heat-capacity/addenda'
import { analyseHeatCapacity } from '#shared/heat-capacity/analyse'
import type { StandardReading } from '#shared/heat-capacity/copper-standard'
import { fitLowTemperature, withMassUncertainty } from '#shared/heat-capacity/fit'
import { scaledCurve } from '#shared/heat-capacity/suggestions'
import type { CorrectionSuggestion, FitModel, HeatCapacityAnalysis, HeatCapacityCurve, HeatCapacitySample, LowTemperatureFit } from '#shared/heat-capacity/types'
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

/** The curve of the sample alone with its fit; indices of the fit count in this curve. */
export interface FittedCurve { readonly curve: HeatCapacityCurve, readonly fit: LowTemperatureFit }

/**
 * The fit alone, without checks: fast enough to follow a dragged window.
 *
 * @param input the dataset and the choices
 * @returns the net curve and its fit, errors with the mass in them
 * @throws DomainError as `analyseDataset`
 */
export function fitDataset(input: DatasetAnalysisInput): FittedCurve {
  const { sample, model } = input
  const curve = netCurve(input)
  const fit = fitLowTemperature(curve, model, { atomsPerFormulaUnit: sample.atomsPerFormulaUnit })
  const { massMg, massUncertaintyMg } = sample
  return { curve, fit: massMg && massUncertaintyMg !== undefined ? withMassUncertainty(fit, massUncertaintyMg / massMg) : fit }
}

/** The curve of the sample: the accepted conversion in, addenda off; where addenda do not reach, only points outside the window are left out. */
export function netCurve(input: Pick<DatasetAnalysisInput, 'curve' | 'correction' | 'holder' | 'sample' | 'model'>): HeatCapacityCurve {
  const total = correctedCurve(input)
  return input.holder ? subtractAddenda(total, { kind: 'table', curve: addendaPerMole(input.holder, input.sample) }, input.model.windowK).curve : total
}

function correctedCurve({ curve, correction }: Pick<DatasetAnalysisInput, 'curve' | 'correction'>): HeatCapacityCurve {
  return correction ? scaledCurve(curve, correction.factor) : curve
}
