import { and, desc, eq, isNotNull, lt } from 'drizzle-orm'
import { COPPER_REFERENCE_RANGE_K, copperReferenceHeatCapacity } from '#shared/materials/copper-reference'
import type { CopperReading } from '#shared/types/results'
import type { Database } from '#server/db/client'
import { datasets, runs } from '#server/db/schema'

/** Where cryostats are compared with the published equation: above, points of all of them are dense and precise. */
const COMPARED_K: readonly [number, number] = [4, 20]
const SHOWN = 60

/**
 * Readings of the copper standard on a cryostat, newest first: the data of its control chart.
 *
 * @param db database
 * @param where which cryostat, and before which instant
 */
export async function copperHistory(db: Database, where: { cryostatId: string, before: Date }): Promise<CopperReading[]> {
  const rows = await db.select({ id: datasets.id, at: datasets.createdAt, runNumber: runs.number, temperatureK: datasets.temperatureK, heatCapacity: datasets.heatCapacity })
    .from(datasets).innerJoin(runs, eq(runs.id, datasets.runId))
    .where(and(eq(datasets.role, 'copper-standard'), isNotNull(datasets.temperatureK), eq(runs.cryostatId, where.cryostatId), lt(datasets.createdAt, where.before)))
    .orderBy(desc(datasets.createdAt)).limit(SHOWN)
  return rows.flatMap(({ id, at, runNumber, temperatureK, heatCapacity }) => {
    const departure = departureFromReference(temperatureK ?? [], heatCapacity ?? [])
    return departure ? [{ datasetId: id, at: at.toISOString(), runNumber, ...departure }] : []
  })
}

/** The newest reading, or null when the cryostat has none. */
export async function lastCopperReading(db: Database, where: { cryostatId: string, before: Date }): Promise<CopperReading | null> {
  return (await copperHistory(db, where))[0] ?? null
}

function departureFromReference(temperatureK: readonly number[], heatCapacity: readonly number[]): Omit<CopperReading, 'datasetId' | 'at' | 'runNumber'> | null {
  const [low, high] = [Math.max(COMPARED_K[0], COPPER_REFERENCE_RANGE_K[0]), Math.min(COMPARED_K[1], COPPER_REFERENCE_RANGE_K[1])]
  const used = temperatureK.map((_, index) => index).filter(index => temperatureK[index]! >= low && temperatureK[index]! <= high)
  if (used.length === 0) return null
  const percent = used.map(index => (heatCapacity[index]! / copperReferenceHeatCapacity(temperatureK[index]!) - 1) * 100)
  return {
    meanDeviationPercent: percent.reduce((sum, each) => sum + each, 0) / percent.length,
    largestDeviationPercent: percent.reduce((most, each) => Math.abs(each) > Math.abs(most) ? each : most, 0),
    temperatureRangeK: [temperatureK[used[0]!]!, temperatureK[used.at(-1)!]!],
    pointCount: used.length,
  }
}
