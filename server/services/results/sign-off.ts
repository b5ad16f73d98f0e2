import { desc, eq } from 'drizzle-orm'
import type { Actor } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import type { Database } from '#server/db/client'
import { analyses, datasets, signOffs } from '#server/db/schema'
import { writeAudit } from '#server/services/audit/write-audit'
import { analysisFor } from './run-of'

/**
 * Signs an analysis, or says why not. The signature names the analysis it saw; it does not pass to a later one.
 *
 * @param db database
 * @param signature which analysis, accepted or not, and the reason
 * @throws DomainError `not-allowed` for others than a PI of the group or a manager, `conflict` when a newer analysis
 *   exists or this person has already said the same, `invalid` when a failing result is accepted without words
 */
export async function signOff(db: Database, signature: { analysisId: string, accepted: boolean, reason: string, actor: Actor, now: Date }): Promise<{ signOffId: string }> {
  const { analysisId, accepted, reason, actor, now } = signature
  return db.transaction(async (tx) => {
    const { analysis } = await analysisFor(tx, analysisId, actor, 'analysis:sign')
    // The dataset's row lock makes signing and saving a newer analysis take turns.
    await tx.select({ id: datasets.id }).from(datasets).where(eq(datasets.id, analysis.datasetId)).for('update')
    const [newest] = await tx.select({ id: analyses.id }).from(analyses).where(eq(analyses.datasetId, analysis.datasetId)).orderBy(desc(analyses.id)).limit(1)
    if (newest?.id !== analysisId) {
      throw new DomainError('conflict', 'A newer analysis of this dataset was saved after the one you looked at. Open the newest and sign that.', ['analysisId'])
    }
    if (reason.trim().length === 0 && (!accepted || analysis.verdict !== 'ok')) {
      throw new DomainError('invalid', accepted ? 'This result does not pass every check. Say why you accept it.' : 'Say why you do not accept this result.', ['reason'])
    }
    const [last] = await tx.select().from(signOffs).where(eq(signOffs.analysisId, analysisId)).orderBy(desc(signOffs.id)).limit(1)
    if (last && last.personId === actor.personId && last.accepted === accepted && last.reason === reason.trim()) return { signOffId: last.id }
    const [added] = await tx.insert(signOffs).values({ analysisId, personId: actor.personId, accepted, reason: reason.trim(), at: now }).returning({ id: signOffs.id })
    await writeAudit(tx, { actorId: actor.personId, action: 'analysis:sign', objectType: 'analysis', objectId: analysisId, detail: { accepted, verdict: analysis.verdict } })
    return { signOffId: added!.id }
  })
}
