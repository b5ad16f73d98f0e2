import { eq } from 'drizzle-orm'
import type { Action, Actor } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import type { Database } from '#server/db/client'
import { analyses, datasets, runs } from '#server/db/schema'
import { authorise } from '#server/services/access/authorise'

const NOTHING_HERE = 'There is nothing here, or it is not yours to see.'

/**
 * A dataset with its run, if the actor may do this to it.
 *
 * @param db database or transaction
 * @param datasetId which dataset
 * @param actor who asks
 * @param action what they want to do
 * @throws DomainError `not-found` or `not-allowed`
 */
export async function datasetFor(db: Database, datasetId: string, actor: Actor, action: Action) {
  const [row] = await db.select({ dataset: datasets, run: runs }).from(datasets).innerJoin(runs, eq(runs.id, datasets.runId)).where(eq(datasets.id, datasetId))
  authorise(actor, action, row ? { groupId: row.run.groupId } : {})
  if (!row) throw new DomainError('not-found', NOTHING_HERE)
  return row
}

/**
 * An analysis with its dataset and run, if the actor may do this to it.
 *
 * @param db database or transaction
 * @param analysisId which analysis
 * @param actor who asks
 * @param action what they want to do
 * @throws DomainError `not-found` or `not-allowed`
 */
export async function analysisFor(db: Database, analysisId: string, actor: Actor, action: Action) {
  const [row] = await db.select({ analysis: analyses, dataset: datasets, run: runs }).from(analyses)
    .innerJoin(datasets, eq(datasets.id, analyses.datasetId)).innerJoin(runs, eq(runs.id, datasets.runId)).where(eq(analyses.id, analysisId))
  authorise(actor, action, row ? { groupId: row.run.groupId } : {})
  if (!row) throw new DomainError('not-found', NOTHING_HERE)
  return row
}
