import { carriersOf } from '#shared/heat-capacity/checks/context'
import { fittedEntropy } from '#shared/heat-capacity/prediction'
import type { HeatCapacitySample, LowTemperatureFit } from '#shared/heat-capacity/types'
import { handbookEntry } from '#shared/materials/elements'
import { densityOfStatesPerEV, freeElectronGas, kadowakiWoodsRatio, wilsonRatio } from '#shared/materials/free-electron'

/** One derived number. */
export interface DerivedQuantity {
  readonly id: 'free-electron-gamma' | 'mass-ratio' | 'fermi-temperature' | 'density-of-states' | 'entropy' | 'wilson-ratio' | 'kadowaki-woods-ratio'
  readonly label: string
  readonly value: number
  readonly standardError?: number
  readonly unit: string
  /** What it rests on. */
  readonly note: string
}

/** Measurements from elsewhere that two of the ratios need. */
export interface DerivedInputs {
  /** Pauli susceptibility per mole of formula units, emu/mol (cgs). */
  readonly susceptibilityEmuPerMol?: number
  /** A of ρ = ρ₀ + AT², µΩ cm/K². */
  readonly resistivityCoefficient?: number
}

/**
 * Numbers that follow from a fit: free-electron γ₀, thermal mass, Fermi temperature, density of states, entropy, Wilson and Kadowaki–Woods ratios.
 *
 * @param fit as reported
 * @param sample its sheet; density and conduction electrons fall back on the handbook
 * @param inputs susceptibility and resistivity coefficient, where entered
 * @returns those that can be told; an insulator has its entropy only
 */
export function derivedQuantities(fit: LowTemperatureFit, sample: HeatCapacitySample, inputs: DerivedInputs = {}): DerivedQuantity[] {
  const entropy = fittedEntropy(fit)
  const last: DerivedQuantity = { id: 'entropy', label: 'Entropy at the warm end', value: entropy.value, standardError: entropy.standardError, unit: entropy.unit, note: entropy.note }
  const gamma = fit.coefficients.gamma
  if (!gamma || !(gamma.value > 0) || sample.kind === 'insulator') return [last]
  const share = gamma.standardError / gamma.value
  const carriers = carriersOf({ sample, handbook: handbookEntry(sample.formula) })
  const quantities: DerivedQuantity[] = []
  if (carriers) {
    const gas = freeElectronGas(carriers)
    const note = `${carriers.electronsPerFormulaUnit} conduction electrons per formula unit, ${carriers.densityGPerCm3} g/cm³`
    const ratio = gamma.value / gas.gamma0
    quantities.push(
      { id: 'free-electron-gamma', label: 'Free-electron γ₀', value: gas.gamma0, unit: 'mJ/(mol K²)', note },
      { id: 'mass-ratio', label: 'm*/m = γ/γ₀', value: ratio, standardError: ratio * share, unit: '', note },
      { id: 'fermi-temperature', label: 'Fermi temperature of free electrons', value: gas.fermiTemperatureK, unit: 'K', note },
    )
  }
  const states = densityOfStatesPerEV(gamma.value)
  quantities.push({ id: 'density-of-states', label: 'Density of states at E_F', value: states, standardError: states * share, unit: 'states/eV', note: 'Per formula unit, both spins, with its enhancement' })
  quantities.push(last)
  if (inputs.susceptibilityEmuPerMol !== undefined) {
    const ratio = wilsonRatio(inputs.susceptibilityEmuPerMol, gamma.value)
    quantities.push({ id: 'wilson-ratio', label: 'Wilson ratio', value: ratio, standardError: ratio * share, unit: '', note: '1 for free electrons, towards 2 for a Kondo impurity' })
  }
  if (inputs.resistivityCoefficient !== undefined) {
    const ratio = kadowakiWoodsRatio(inputs.resistivityCoefficient, gamma.value)
    quantities.push({ id: 'kadowaki-woods-ratio', label: 'Kadowaki–Woods ratio', value: ratio, standardError: 2 * ratio * share, unit: 'µΩ cm (mol K/mJ)²', note: '1.0 × 10⁻⁵ for heavy electrons, 0.4 × 10⁻⁶ for transition metals (from memory)' })
  }
  return quantities
}
