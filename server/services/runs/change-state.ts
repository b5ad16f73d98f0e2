import { and, eq } from 'drizzle-orm'
import { DomainError } from '#shared/errors'
import { type RunStep, transition } from '#shared/runs/transition'
import { constraintOf } from '#server/db/constraint'
import type { Database } from '#server/db/client'
import { runs, runTransitions } from '#server/db/schema'
import { writeAudit } from '#server/services/audit/write-audit'

/** A run as its row stands. */
export type Run = typeof runs.$inferSelect

/** What is written beside the new state. */
export type RunChanges = Partial<Pick<Run, 'payBy' | 'startedAt' | 'finishedAt' | 'cutShort' | 'operatorHours'>>

/**
 * Takes one step in the life of a run: the only writer of `runs.state`. The row is changed only as it was read, the step
 * is kept for ever, and an audit row is written, all in the caller's transaction.
 *
 * @param tx transaction
 * @param input the run as read, the step, who takes it (null for the facility's own jobs), why, and when
 * @returns the run as it stands now
 * @throws DomainError `conflict` when the step does not begin here, another change came first, or the days are taken
 */
export async function changeRunState(tx: Database, input: { run: Run, step: RunStep, actorId: string | null, reason?: string, now: Date, changes?: RunChanges }): Promise<Run> {
  const { run, step, actorId, reason = '', now, changes } = input
  const state = transition(run.state, step, reason)
  const [changed] = await tx.update(runs).set({ ...changes, state, version: run.version + 1 })
    .where(and(eq(runs.id, run.id), eq(runs.state, run.state), eq(runs.version, run.version))).returning()
    .catch((error: unknown) => {
      if (constraintOf(error) === 'cryostat_holds_no_overlap') {
        throw new DomainError('conflict', 'Another run or a closure holds these days. Choose other days, or withdraw that one first.', ['slot'])
      }
      throw error
    })
  if (!changed) throw new DomainError('conflict', 'This run was changed by someone else a moment ago. Reload to see how it stands.')
  await tx.insert(runTransitions).values({ runId: run.id, fromState: run.state, toState: state, actorId, reason, at: now })
  await writeAudit(tx, { actorId, action: `run:${step}`, objectType: 'run', objectId: run.id, detail: { from: run.state, to: state, reason } })
  return changed
}
