import { eq } from 'drizzle-orm'
import type { Action, Actor } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import type { Database } from '#server/db/client'
import { runs } from '#server/db/schema'
import { authorise } from '#server/services/access/authorise'
import type { Run } from './change-state'

/**
 * Reads a run for changing: locked, so that changes to it come one after another, and checked for rights.
 *
 * @param tx transaction
 * @param runId which run
 * @param actor who wants to change it
 * @param action what they want to do
 * @throws DomainError `not-found` for a run that is not there or not theirs
 */
export async function lockRun(tx: Database, runId: string, actor: Actor, action: Action): Promise<Run> {
  const [run] = await tx.select().from(runs).where(eq(runs.id, runId)).for('update')
  authorise(actor, action, run ? { groupId: run.groupId, ownerId: run.requestedBy } : {})
  // A facility role passes the check above for any object; one that does not exist is still not there.
  if (!run) throw new DomainError('not-found', 'There is no such run. It may have been mistyped; look for it under Runs.')
  return run
}
