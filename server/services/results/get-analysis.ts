import { asc, eq } from 'drizzle-orm'
import { type Actor, can } from '#shared/access/rules'
import type { AnalysisView, SignOffView } from '#shared/types/results'
import type { Database } from '#server/db/client'
import { analysisComments, people, signOffs } from '#server/db/schema'
import { authorise } from '#server/services/access/authorise'
import { sharedRead } from '#server/utils/shared-read'
import { curveSha256 } from './curve-hash'
import { analysisFor } from './run-of'

/**
 * A saved analysis with its lineage, signatures and remarks.
 *
 * @param db database
 * @param request which analysis and who asks
 * @throws DomainError `not-found` when the actor may not see it
 */
export async function getAnalysis(db: Database, request: AnalysisRequest): Promise<AnalysisView> {
  const { view, groupId } = await sharedAnalysis(db, request)
  authorise(request.actor, 'analysis:read', { groupId })
  return view
}

interface AnalysisRequest { analysisId: string, actor: Actor }

const sharedAnalysis = sharedRead(JSON.stringify, async (db: Database, request: AnalysisRequest): Promise<{ view: AnalysisView, groupId: string }> => {
  const { analysis, dataset, run } = await analysisFor(db, request.analysisId, request.actor, 'analysis:read')
  const { lineage, ...result } = analysis.result
  const [author] = await db.select({ name: people.name }).from(people).where(eq(people.id, analysis.createdBy))
  const view: AnalysisView = {
    id: analysis.id,
    datasetId: analysis.datasetId,
    createdAt: analysis.createdAt.toISOString(),
    createdByName: author?.name ?? '',
    sample: analysis.sample,
    result,
    lineage,
    restsOnCurrentCurve: lineage.curveSha256 === curveSha256(dataset),
    signOffs: await signOffsOf(db, analysis.id),
    comments: await commentsOf(db, analysis.id),
    maySign: can(request.actor, 'analysis:sign', { groupId: run.groupId }),
  }
  return { view, groupId: run.groupId }
})

async function signOffsOf(db: Database, analysisId: string): Promise<SignOffView[]> {
  const rows = await db.select({ id: signOffs.id, accepted: signOffs.accepted, reason: signOffs.reason, at: signOffs.at, personName: people.name })
    .from(signOffs).innerJoin(people, eq(people.id, signOffs.personId)).where(eq(signOffs.analysisId, analysisId)).orderBy(asc(signOffs.at), asc(signOffs.id))
  return rows.map(row => ({ ...row, at: row.at.toISOString() }))
}

async function commentsOf(db: Database, analysisId: string) {
  const rows = await db.select({ id: analysisComments.id, text: analysisComments.text, at: analysisComments.at, personName: people.name })
    .from(analysisComments).innerJoin(people, eq(people.id, analysisComments.personId)).where(eq(analysisComments.analysisId, analysisId)).orderBy(asc(analysisComments.at), asc(analysisComments.id))
  return rows.map(row => ({ ...row, at: row.at.toISOString() }))
}
