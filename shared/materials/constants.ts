/**
 * Physical constants with their unit in the name. k_B, N_A, h and e are exact by definition of the SI since 2019
 * (BIPM, SI Brochure, 9th edition, 2019); measured ones are CODATA 2022 (2018 differs by parts in 10⁹).
 */

/** Boltzmann constant k_B, J/K, exact (SI 2019). */
export const BOLTZMANN_CONSTANT_J_PER_K = 1.380649e-23

/** Avogadro constant N_A, 1/mol, exact (SI 2019). */
export const AVOGADRO_CONSTANT_PER_MOL = 6.02214076e23

/** Planck constant h, J s, exact (SI 2019). */
export const PLANCK_CONSTANT_J_S = 6.62607015e-34

/** Reduced Planck constant ħ = h/2π, J s, exact. */
export const REDUCED_PLANCK_CONSTANT_J_S = PLANCK_CONSTANT_J_S / (2 * Math.PI)

/** Elementary charge e, C; also the size of an electronvolt in J; exact (SI 2019). */
export const ELEMENTARY_CHARGE_C = 1.602176634e-19

/** Molar gas constant R = k_B N_A, J/(mol K), exact product. */
export const GAS_CONSTANT_J_PER_MOL_K = 8.31446261815324

/** Electron mass, kg (CODATA 2022). */
export const ELECTRON_MASS_KG = 9.1093837139e-31

/** Bohr magneton μ_B, J/T (CODATA 2022). */
export const BOHR_MAGNETON_J_PER_T = 9.2740100657e-24

/** Vacuum magnetic permeability μ₀, N/A² (CODATA 2022; 4π × 10⁻⁷ to 10⁻¹⁰). */
export const VACUUM_PERMEABILITY_N_PER_A2 = 1.25663706127e-6

/** 12π⁴R/5, J/(mol K): β₃ = this · r/Θ_D³ (Debye's T³ law). */
export const DEBYE_T3_CONSTANT_J_PER_MOL_K = 12 * Math.PI ** 4 / 5 * GAS_CONSTANT_J_PER_MOL_K

/** (π²/3) k_B² N_A / eV in mJ/(mol K²) for one state per eV and formula unit, both spins counted: γ = this · N(E_F). */
export const GAMMA_MJ_PER_MOL_K2_PER_STATE_PER_EV
  = Math.PI ** 2 / 3 * BOLTZMANN_CONSTANT_J_PER_K ** 2 * AVOGADRO_CONSTANT_PER_MOL / ELEMENTARY_CHARGE_C * 1000

/** ΔC/(γT_c) of a weak-coupling superconductor, 12/(7ζ(3)). Source: Bardeen, Cooper & Schrieffer, Phys. Rev. 108, 1175 (1957). */
export const BCS_JUMP_RATIO = 12 / (7 * 1.2020569031595942)
