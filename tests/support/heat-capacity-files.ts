import { debyeHeatCapacity } from '#shared/heat-capacity/debye'
import { readTable } from '#shared/heat-capacity/read-table'
import { checkTable } from '#shared/heat-capacity/check-table'
import type { HeatCapacityReport } from '#shared/heat-capacity/report-json'
import { analysisSampleSchema } from '#shared/schemas/heat-capacity'
import type { FitTerm } from '#shared/heat-capacity/types'
import { GAS_CONSTANT_J_PER_MOL_K } from '#shared/materials/constants'
import { copperReferenceHeatCapacity } from '#shared/materials/copper-reference'

/** Heat capacity, mJ/(mol K), at a temperature in K. */
export type Law = (temperatureK: number) => number

/** Numbers from 0 to 1 that are the same in every run (mulberry32). */
export function seeded(seed: number): () => number {
  let state = seed
  return () => {
    state = (state + 0x6d2b79f5) | 0
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state)
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296
  }
}

/** Normal deviates by Box and Muller. */
export function normals(seed: number): () => number {
  const next = seeded(seed)
  return () => Math.sqrt(-2 * Math.log(1 - next())) * Math.cos(2 * Math.PI * next())
}

/** Electrons and a Debye lattice. */
export function metalLaw(gamma: number, debyeTemperatureK: number, atoms = 1): Law {
  return t => gamma * t + 3000 * atoms * GAS_CONSTANT_J_PER_MOL_K * debyeHeatCapacity(t / debyeTemperatureK)
}

/** Copper by its published reference equation. */
export const copperLaw: Law = copperReferenceHeatCapacity
/** Silver by its handbook values: γ 0.646 mJ/(mol K²), Θ_D 225 K (C. Kittel, ch. 5 and 6, from memory). */
export const silverLaw = metalLaw(0.646, 225)
/** Sapphire by its handbook Θ_D of 1047 K with five atoms (from memory). */
export const sapphireLaw = metalLaw(0, 1047, 5)

/** How a made measurement is written. */
export interface Measurement {
  law: Law
  fromK: number
  toK: number
  points?: number
  /** Relative noise; also the stated σ unless `statedNoise` differs. */
  noise?: number
  statedNoise?: number
  /** Multiplies what is written: unit and slips. */
  factor?: number
  unit?: string
  seed?: number
  withSigma?: boolean
}

/** Writes a table of a made measurement, evenly spread in ln T. */
export function measuredTable({ law, fromK, toK, points = 40, noise = 0.005, statedNoise = noise, factor = 1, unit = 'mJ/(mol K)', seed = 7, withSigma = true }: Measurement): string {
  const normal = normals(seed)
  const rows = Array.from({ length: points }, (_, index) => {
    const temperature = fromK * (toK / fromK) ** (index / (points - 1))
    const value = law(temperature) * factor
    return [temperature.toFixed(5), (value * (1 + noise * normal())).toPrecision(9), ...(withSigma ? [(Math.abs(value) * statedNoise).toPrecision(4)] : [])].join(',')
  })
  return [`T (K),C (${unit})${withSigma ? `,sigma C (${unit})` : ''}`, ...rows, ''].join('\n')
}

/** What a check of a written table is asked with. */
export interface Asked {
  formula: string
  kind?: 'metal' | 'superconductor' | 'insulator' | 'unknown'
  massMg?: number
  massUncertaintyMg?: number
  densityGPerCm3?: number
  volumeMm3?: number
  conductionElectrons?: number
  criticalTemperatureK?: number
  terms?: FitTerm[]
  windowK?: [number, number]
  addenda?: string
  thresholds?: Record<string, number>
}

/** Runs the engine on a table as the command line does. */
export function checkText(text: string, { terms, windowK, addenda, thresholds, ...sample }: Asked): HeatCapacityReport {
  return checkTable({
    table: { table: readTable(text) },
    sample: analysisSampleSchema.parse({ kind: 'metal', ...sample }),
    terms, windowK, thresholds,
    addenda: addenda === undefined ? undefined : { table: readTable(addenda) },
  })
}

/** Status of each check by its id. */
export function statuses(report: HeatCapacityReport): Record<string, string> {
  return Object.fromEntries(report.checks.map(check => [check.id, check.status]))
}
