import { debyeHeatCapacity, einsteinHeatCapacity, schottkyHeatCapacity } from '#shared/heat-capacity/debye'
import { TERM_UNIT, termValue } from '#shared/heat-capacity/terms'
import type { FitTerm } from '#shared/heat-capacity/types'
import { GAS_CONSTANT_J_PER_MOL_K } from '#shared/materials/constants'

/** Models beyond the low-temperature series: two levels, a gap, and lattices over the whole range. */
export type CurveModelId = 'schottky' | 'gapped-exponential' | 'debye' | 'debye-einstein'

/** Which model, over which temperatures, with which terms of the series beside it. */
export interface CurveModel {
  readonly id: CurveModelId
  readonly windowK: readonly [number, number]
  /** Terms added to it, e.g. γT of the electrons; none when left out. */
  readonly background?: readonly FitTerm[]
  /** Schottky only: g₁/g₀ held at a number, or `fit`; 1 when left out. */
  readonly degeneracyRatio?: number | 'fit'
}

/** A parameter with its unit. */
export interface ModelParameter { readonly name: string, readonly unit: string }

/** A parameter inside a function, always above zero, with the values to start from. */
export interface ShapeParameter extends ModelParameter { readonly grid: readonly number[] }

/**
 * A model written as C(T) = fixed(T; s) + Σ aⱼ φⱼ(T; s): shapes s inside functions, amounts a in front of them.
 * For given shapes the amounts follow by linear least squares, which is how starts are found.
 */
export interface SeparableModel {
  readonly shapes: readonly ShapeParameter[]
  readonly amounts: readonly ModelParameter[]
  /** Part without an amount, mJ/(mol K). */
  readonly fixed: (temperatureK: number, shapes: readonly number[]) => number
  /** One function for each amount, mJ/(mol K) for an amount of 1. */
  readonly functions: readonly ((temperatureK: number, shapes: readonly number[]) => number)[]
}

const R_MJ = 1000 * GAS_CONSTANT_J_PER_MOL_K
const DEBYE_TEMPERATURE = { name: 'debyeTemperature', unit: 'K' } as const
const nothing = () => 0

/** Numbers from one to another in equal ratios. */
function ratios(from: number, to: number, count: number): number[] {
  return Array.from({ length: count }, (_, index) => from * (to / from) ** (index / (count - 1)))
}

function core({ id, windowK: [low, high], degeneracyRatio = 1 }: CurveModel, atomsPerFormulaUnit: number): SeparableModel {
  const from = Math.max(low, high / 1e3)
  const gap: ShapeParameter = { name: 'gap', unit: 'K', grid: ratios(from / 3, high * 10, 28) }
  switch (id) {
    case 'schottky': {
      const fitted = degeneracyRatio === 'fit'
      return {
        shapes: fitted ? [gap, { name: 'degeneracyRatio', unit: '1', grid: [0.5, 1, 2, 4] }] : [gap],
        amounts: [{ name: 'amount', unit: 'mol/mol' }],
        fixed: nothing,
        functions: [(t, [delta, g]) => R_MJ * schottkyHeatCapacity(t / delta!, fitted ? g : degeneracyRatio)],
      }
    }
    case 'gapped-exponential':
      return { shapes: [gap], amounts: [{ name: 'prefactor', unit: 'mJ/(mol K)' }], fixed: nothing, functions: [(t, [delta]) => Math.exp(-delta! / t)] }
    case 'debye':
      return { shapes: [{ ...DEBYE_TEMPERATURE, grid: ratios(high / 5, high * 100, 40) }], amounts: [], fixed: (t, [theta]) => 3 * atomsPerFormulaUnit * R_MJ * debyeHeatCapacity(t / theta!), functions: [] }
    case 'debye-einstein':
      return {
        shapes: [{ ...DEBYE_TEMPERATURE, grid: ratios(high / 4, high * 20, 18) }, { name: 'einsteinTemperature', unit: 'K', grid: ratios(high / 10, high * 10, 18) }],
        amounts: [{ name: 'debyeAtoms', unit: '1' }, { name: 'einsteinAtoms', unit: '1' }],
        fixed: nothing,
        functions: [(t, [theta]) => 3 * R_MJ * debyeHeatCapacity(t / theta!), (t, [, theta]) => 3 * R_MJ * einsteinHeatCapacity(t / theta!)],
      }
  }
}

/**
 * The functions and parameters of a model.
 *
 * - `schottky`: n R x² g e⁻ˣ/(1 + g e⁻ˣ)², x = Δ/T; n moles of two-level systems per mole of formula units.
 * - `gapped-exponential`: A e^(−Δ/T), as of a superconductor far below T_c or of a gapped magnet.
 * - `debye`: 3rR times the whole Debye function; r atoms per formula unit are given, not fitted.
 * - `debye-einstein`: 3R times the atoms in acoustic (Debye) and optical (Einstein) modes, whose sum should come near r.
 *
 * The two lattices give C_V; measured C_p is larger by some per cent near room temperature.
 *
 * @param model which one, its window (K) and the terms beside it
 * @param atomsPerFormulaUnit r
 */
export function separableModel(model: CurveModel, atomsPerFormulaUnit: number): SeparableModel {
  const own = core(model, atomsPerFormulaUnit)
  const background = model.background ?? []
  return {
    ...own,
    amounts: [...own.amounts, ...background.map(term => ({ name: term, unit: TERM_UNIT[term] }))],
    functions: [...own.functions, ...background.map(term => (t: number) => termValue(term, t))],
  }
}
