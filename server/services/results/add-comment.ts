import type { Actor } from '#shared/access/rules'
import type { Database } from '#server/db/client'
import { analysisComments } from '#server/db/schema'
import { writeAudit } from '#server/services/audit/write-audit'
import { analysisFor } from './run-of'

/**
 * Adds a remark to an analysis.
 *
 * @param db database
 * @param comment which analysis, the words, who and when
 * @throws DomainError `not-found` when the actor may not see the analysis
 */
export async function addComment(db: Database, comment: { analysisId: string, text: string, actor: Actor, now: Date }): Promise<{ commentId: string }> {
  return db.transaction(async (tx) => {
    await analysisFor(tx, comment.analysisId, comment.actor, 'analysis:comment')
    const [added] = await tx.insert(analysisComments).values({ analysisId: comment.analysisId, personId: comment.actor.personId, text: comment.text, at: comment.now }).returning({ id: analysisComments.id })
    await writeAudit(tx, { actorId: comment.actor.personId, action: 'analysis:comment', objectType: 'analysis', objectId: comment.analysisId })
    return { commentId: added!.id }
  })
}
