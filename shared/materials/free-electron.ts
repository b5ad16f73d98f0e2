import { DomainError } from '#shared/errors'
import {
  AVOGADRO_CONSTANT_PER_MOL, BOHR_MAGNETON_J_PER_T, BOLTZMANN_CONSTANT_J_PER_K, ELECTRON_MASS_KG, ELEMENTARY_CHARGE_C,
  GAMMA_MJ_PER_MOL_K2_PER_STATE_PER_EV, GAS_CONSTANT_J_PER_MOL_K, REDUCED_PLANCK_CONSTANT_J_S, VACUUM_PERMEABILITY_N_PER_A2,
} from '#shared/materials/constants'

/** Facts of a material that a gas of free electrons needs. */
export interface CarrierFacts {
  /** Conduction electrons per formula unit. */
  readonly electronsPerFormulaUnit: number
  readonly molarMassGPerMol: number
  readonly densityGPerCm3: number
}

/** The gas of free electrons of the same density. */
export interface FreeElectronGas {
  /** Electrons per volume, 1/m³. */
  readonly carrierDensityPerM3: number
  readonly fermiEnergyEV: number
  readonly fermiTemperatureK: number
  /** γ₀ per mole of formula units, mJ/(mol K²). */
  readonly gamma0: number
}

function mustBePositive(value: number, field: string, words: string): void {
  if (!(value > 0 && Number.isFinite(value))) throw new DomainError('invalid', `${words} must be above zero. Enter it in the sample sheet.`, [field])
}

/**
 * Fermi energy, Fermi temperature and Sommerfeld's γ₀ of free electrons at the material's carrier density.
 * E_F = ħ²(3π²n)^(2/3)/2m, T_F = E_F/k_B, γ₀ = (π²/2) z R/T_F per mole of formula units.
 * Source: A. Sommerfeld, Z. Phys. 47, 1 (1928); N. W. Ashcroft and N. D. Mermin, Solid State Physics, eq. 2.80.
 *
 * @param carriers electrons per formula unit, molar mass (g/mol), density (g/cm³)
 * @returns carrier density (1/m³), E_F (eV), T_F (K), γ₀ (mJ/(mol K²))
 * @throws DomainError when one of the three is not above zero
 * @example freeElectronGas({ electronsPerFormulaUnit: 1, molarMassGPerMol: 63.546, densityGPerCm3: 8.96 }).gamma0 // 0.5019
 */
export function freeElectronGas(carriers: CarrierFacts): FreeElectronGas {
  const { electronsPerFormulaUnit, molarMassGPerMol, densityGPerCm3 } = carriers
  mustBePositive(electronsPerFormulaUnit, 'conductionElectrons', 'Conduction electrons per formula unit')
  mustBePositive(molarMassGPerMol, 'molarMassGPerMol', 'The molar mass')
  mustBePositive(densityGPerCm3, 'densityGPerCm3', 'The density')
  const carrierDensityPerM3 = electronsPerFormulaUnit * densityGPerCm3 * 1e6 / molarMassGPerMol * AVOGADRO_CONSTANT_PER_MOL
  const fermiWaveVector = Math.cbrt(3 * Math.PI ** 2 * carrierDensityPerM3)
  const fermiEnergyJ = (REDUCED_PLANCK_CONSTANT_J_S * fermiWaveVector) ** 2 / (2 * ELECTRON_MASS_KG)
  const fermiTemperatureK = fermiEnergyJ / BOLTZMANN_CONSTANT_J_PER_K
  const gamma0 = Math.PI ** 2 / 2 * electronsPerFormulaUnit * GAS_CONSTANT_J_PER_MOL_K / fermiTemperatureK * 1000
  return { carrierDensityPerM3, fermiEnergyEV: fermiEnergyJ / ELEMENTARY_CHARGE_C, fermiTemperatureK, gamma0 }
}

/**
 * Density of states at the Fermi level that a measured γ stands for (band and enhancement together): N = 3γ/(π²k_B²).
 * Source: N. W. Ashcroft and N. D. Mermin, Solid State Physics, eq. 2.79.
 *
 * @param gamma mJ/(mol K²)
 * @returns states per eV and formula unit, both spins counted
 */
export function densityOfStatesPerEV(gamma: number): number {
  return gamma / GAMMA_MJ_PER_MOL_K2_PER_STATE_PER_EV
}

/** cm³/mol (the cgs "emu/mol") to m³/mol of the SI susceptibility. */
const SI_PER_CGS_SUSCEPTIBILITY = 4 * Math.PI * 1e-6

/**
 * Wilson ratio R_W = π²k_B²χ/(3μ₀μ_B²γ): 1 for free electrons, towards 2 for a Kondo impurity.
 * Source: K. G. Wilson, Rev. Mod. Phys. 47, 773 (1975); the prefactor in SI is 5.8023 × 10⁶ (J/(mol K²))/(m³/mol).
 *
 * @param susceptibilityEmuPerMol Pauli susceptibility per mole of formula units, emu/mol (cgs)
 * @param gamma mJ/(mol K²), above zero
 * @returns dimensionless
 * @throws DomainError when γ is not above zero
 */
export function wilsonRatio(susceptibilityEmuPerMol: number, gamma: number): number {
  mustBePositive(gamma, 'gamma', 'γ')
  const susceptibilitySI = susceptibilityEmuPerMol * SI_PER_CGS_SUSCEPTIBILITY
  return Math.PI ** 2 * BOLTZMANN_CONSTANT_J_PER_K ** 2 * susceptibilitySI / (3 * VACUUM_PERMEABILITY_N_PER_A2 * BOHR_MAGNETON_J_PER_T ** 2 * gamma * 1e-3)
}

/** Usual Kadowaki–Woods ratios, µΩ cm (mol K/mJ)², each with its source. */
export const KADOWAKI_WOODS_USUAL = {
  heavyElectrons: { value: 1.0e-5, source: 'K. Kadowaki and S. B. Woods, Solid State Commun. 58, 507 (1986); from memory' },
  transitionMetals: { value: 0.4e-6, source: 'M. J. Rice, Phys. Rev. Lett. 20, 1439 (1968); from memory' },
} as const

/**
 * Kadowaki–Woods ratio A/γ² of the T² coefficient of the resistivity.
 *
 * @param resistivityCoefficient A of ρ = ρ₀ + AT², µΩ cm/K²
 * @param gamma mJ/(mol K²), above zero
 * @returns µΩ cm (mol K/mJ)²; compare with `KADOWAKI_WOODS_USUAL`
 * @throws DomainError when γ is not above zero
 */
export function kadowakiWoodsRatio(resistivityCoefficient: number, gamma: number): number {
  mustBePositive(gamma, 'gamma', 'γ')
  return resistivityCoefficient / gamma ** 2
}
