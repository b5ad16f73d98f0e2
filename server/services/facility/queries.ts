import type { Database } from '#server/db/client'
import { facilities } from '#server/db/schema'

/** The facility's row. */
export type Facility = typeof facilities.$inferSelect

/**
 * The facility itself.
 *
 * @throws Error when the database was never set up
 */
export async function readFacility(db: Database): Promise<Facility> {
  const [row] = await db.select().from(facilities).limit(1)
  if (!row) throw new Error('the facility is not set up; seed it first')
  return row
}
