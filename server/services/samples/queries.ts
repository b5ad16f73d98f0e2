import { eq, inArray } from 'drizzle-orm'
import { type Actor, hasFacilityRole } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import type { SampleSheet } from '#shared/types/samples'
import type { Database } from '#server/db/client'
import { groups, samples } from '#server/db/schema'
import { authorise } from '#server/services/access/authorise'

function toSheet({ sample, group }: { sample: typeof samples.$inferSelect, group: string }): SampleSheet {
  const { createdAt: _, createdBy: __, ...sheet } = sample
  return { ...sheet, group }
}

/** Samples an actor may see, by name. */
export async function listSamples(db: Database, actor: Actor): Promise<SampleSheet[]> {
  const groupIds = actor.memberships.map(({ groupId }) => groupId)
  // The condition below is the check: it narrows the list to what the actor may read.
  authorise(actor, 'sample:read', { groupId: groupIds[0] })
  const rows = await db.select({ sample: samples, group: groups.name }).from(samples).innerJoin(groups, eq(groups.id, samples.groupId))
    .where(hasFacilityRole(actor) ? undefined : inArray(samples.groupId, groupIds)).orderBy(samples.name)
  return rows.map(toSheet)
}

/**
 * One sample.
 *
 * @throws DomainError `not-found` for one that is not there or not theirs
 */
export async function readSample(db: Database, input: { sampleId: string, actor: Actor }): Promise<SampleSheet> {
  const [row] = await db.select({ sample: samples, group: groups.name }).from(samples).innerJoin(groups, eq(groups.id, samples.groupId)).where(eq(samples.id, input.sampleId))
  authorise(input.actor, 'sample:read', row ? { groupId: row.sample.groupId } : {})
  if (!row) throw new DomainError('not-found', 'There is no such sample. Look for it under Samples.')
  return toSheet(row)
}
