import { and, desc, eq, isNotNull } from 'drizzle-orm'
import { usualBoilOffBand, type BoilOffBand } from '#shared/helium/boil-off'
import type { Database } from '#server/db/client'
import { runEntries, runs } from '#server/db/schema'

const MOST_STRETCHES = 200

/**
 * The usual boil-off band of a cryostat, from the stretches on its own run sheets.
 *
 * @param db database or transaction
 * @param cryostatId the cryostat
 * @returns the band, or undefined while there is too little past
 */
export async function readUsualBoilOff(db: Database, cryostatId: string): Promise<BoilOffBand | undefined> {
  const rows = await db.select({ litresPerHour: runEntries.boilOffLitresPerHour }).from(runEntries)
    .innerJoin(runs, eq(runs.id, runEntries.runId))
    .where(and(eq(runs.cryostatId, cryostatId), isNotNull(runEntries.boilOffLitresPerHour)))
    .orderBy(desc(runEntries.at)).limit(MOST_STRETCHES)
  return usualBoilOffBand(rows.flatMap(row => row.litresPerHour ?? []))
}
