import { isNull } from 'drizzle-orm'
import { cryostatPlanningFacts } from '#shared/planning/cryostat-facts'
import type { PlanOptions } from '#shared/types/plan'
import type { Database } from '#server/db/client'
import { cryostats } from '#server/db/schema'
import { readFacility } from '#server/services/facility/queries'

/** What the plan page offers: the cryostats in use, with their limits. */
export async function readPlanOptions(db: Database): Promise<PlanOptions> {
  const { timeZone, currency } = await readFacility(db)
  const rows = await db.select().from(cryostats).where(isNull(cryostats.retiredAt)).orderBy(cryostats.position)
  return {
    timeZone,
    currency,
    cryostats: rows.map(row => ({
      id: row.id, slug: row.slug, name: row.name, kind: row.kind, baseTemperatureK: row.baseTemperatureK, highestTemperatureK: cryostatPlanningFacts(row).highestTemperatureK,
      maximumFieldT: row.maximumFieldT, usesLiquid: row.usesLiquid, nitrogenPrecool: row.nitrogenPrecool,
    })),
  }
}
