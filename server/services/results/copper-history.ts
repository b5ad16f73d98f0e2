import { and, asc, eq, isNotNull } from 'drizzle-orm'
import { DomainError } from '#shared/errors'
import { compareWithCopper } from '#shared/heat-capacity/copper-standard'
import type { CopperReading } from '#shared/types/results'
import type { Database } from '#server/db/client'
import { datasets, runs } from '#server/db/schema'

/**
 * Readings of the copper standard on a cryostat against the published equation, oldest first: the data of its control chart.
 *
 * @param db database
 * @param cryostatId which cryostat
 */
export async function copperHistory(db: Database, cryostatId: string): Promise<CopperReading[]> {
  const rows = await db.select({ id: datasets.id, at: datasets.createdAt, runNumber: runs.number, temperatureK: datasets.temperatureK, heatCapacity: datasets.heatCapacity })
    .from(datasets).innerJoin(runs, eq(runs.id, datasets.runId))
    .where(and(eq(datasets.role, 'copper-standard'), isNotNull(datasets.temperatureK), eq(runs.cryostatId, cryostatId)))
    .orderBy(asc(datasets.createdAt), asc(datasets.id))
  return rows.flatMap(row => readingOf(row.temperatureK ?? [], row.heatCapacity ?? []).map(reading => ({ ...reading, datasetId: row.id, at: row.at.toISOString(), runNumber: row.runNumber })))
}

/** One reading, or none when no point lies where the equation holds. */
function readingOf(temperatureK: readonly number[], heatCapacity: readonly number[]): Omit<CopperReading, 'datasetId' | 'at' | 'runNumber'>[] {
  try {
    const { points: _, ...reading } = compareWithCopper({ temperatureK, heatCapacity })
    return [reading]
  }
  catch (error) {
    if (error instanceof DomainError) return []
    throw error
  }
}
