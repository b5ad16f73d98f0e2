import { and, desc, eq } from 'drizzle-orm'
import { type Actor, can } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import { analyseDataset, type DatasetAnalysisInput } from '#shared/heat-capacity/analyse-dataset'
import { lastStandardReading } from '#shared/heat-capacity/copper-standard'
import { ENGINE_VERSION } from '#shared/heat-capacity/engine-version'
import type { HeatCapacityCurve } from '#shared/heat-capacity/types'
import type { SaveAnalysisInput } from '#shared/schemas/results'
import type { AnalysisLineage } from '#shared/types/results'
import type { Database } from '#server/db/client'
import { analyses, datasets, runs } from '#server/db/schema'
import { writeAudit } from '#server/services/audit/write-audit'
import { readFacility } from '#server/services/facility/queries'
import { copperHistory } from './copper-history'
import { curveSha256 } from './curve-hash'
import { unpackRows } from './packed-rows'
import { datasetFor } from './run-of'

/** Who saves which analysis of which dataset. */
export type SaveAnalysisRequest = SaveAnalysisInput & { datasetId: string, actor: Actor, now: Date }

type Dataset = typeof datasets.$inferSelect

/**
 * Runs the engine on a stored dataset and keeps what it says for ever: inputs, window, model, engine version, numbers.
 * Saving the newest analysis again gives that one.
 *
 * @param db database
 * @param request dataset, model and window, addenda, accepted correction
 * @throws DomainError `conflict` before the columns are confirmed or when the correction is not one the engine suggests, `invalid` from the fit
 */
export async function saveAnalysis(db: Database, request: SaveAnalysisRequest): Promise<{ analysisId: string, existed: boolean }> {
  const { datasetId, actor, now } = request
  return db.transaction(async (tx) => {
    const { dataset, run } = await datasetFor(tx, datasetId, actor, 'analysis:write')
    // Held against a new mapping, a second press and a signature of the analysis before.
    await tx.select({ id: datasets.id }).from(datasets).where(eq(datasets.id, datasetId)).for('update')
    const addenda = await addendaFor(tx, request, run)
    const readings = (await copperHistory(tx, run.cryostatId)).filter(reading => reading.datasetId !== datasetId).map(reading => ({ ...reading, at: new Date(reading.at) }))
    const input = {
      ...measuredOf(dataset),
      model: request.model,
      holder: addenda ? curveOf(addenda) : undefined,
      standard: lastStandardReading(readings, dataset.createdAt),
      thresholds: (await readFacility(tx)).checkThresholds,
    }
    const correction = correctionOf(input, request.correctionId)
    const result = analyseDataset({ ...input, correction })
    const { rowNumbers: _, ...mapping } = dataset.mapping!
    const lineage: AnalysisLineage = {
      datasetId, originalName: dataset.originalName, fileSha256: dataset.sha256, mapping, curveSha256: curveSha256(dataset),
      addenda: addenda && { datasetId: addenda.id, fileSha256: addenda.sha256 }, correction, windowK: request.model.windowK, engineVersion: ENGINE_VERSION,
    }
    const [newest] = await tx.select().from(analyses).where(eq(analyses.datasetId, datasetId)).orderBy(desc(analyses.createdAt), desc(analyses.id)).limit(1)
    if (newest && newest.createdBy === actor.personId && isSame(newest.result.lineage, lineage) && sameTerms(newest.result.fit.model.terms, request.model.terms) && newest.verdict === result.verdict) {
      return { analysisId: newest.id, existed: true }
    }
    const [added] = await tx.insert(analyses).values({
      datasetId, addendaDatasetId: addenda?.id ?? null, createdBy: actor.personId, sample: input.sample, result: { ...result, lineage },
      verdict: result.verdict, engineVersion: result.engineVersion, correction, createdAt: now,
    }).returning({ id: analyses.id })
    await writeAudit(tx, { actorId: actor.personId, action: 'analysis:write', objectType: 'analysis', objectId: added!.id, detail: { datasetId, model: request.model, verdict: result.verdict, correction: correction?.id ?? null } })
    return { analysisId: added!.id, existed: false }
  })
}

function measuredOf(dataset: Dataset): Pick<DatasetAnalysisInput, 'curve' | 'sample' | 'unit'> {
  if (dataset.role === 'addenda') throw new DomainError('conflict', 'Addenda have no fit of their own. Open the measurement they belong to and choose them there.')
  if (!dataset.mapping?.sample || !dataset.temperatureK) throw new DomainError('conflict', 'The columns of this table are not confirmed yet. Confirm them first.')
  return { curve: curveOf(dataset), sample: dataset.mapping.sample, unit: dataset.mapping.columns.heatCapacity.unit }
}

function curveOf({ temperatureK, heatCapacity, sigma, mapping }: Dataset): HeatCapacityCurve {
  const rowNumbers = unpackRows(mapping?.rowNumbers, temperatureK?.length ?? 0)
  return { temperatureK: temperatureK ?? [], heatCapacity: heatCapacity ?? [], ...(sigma ? { sigma } : {}), ...(rowNumbers ? { rowNumbers } : {}) }
}

/** Addenda measured on the same cryostat that the actor may see. */
async function addendaFor(tx: Database, { addendaDatasetId, actor }: SaveAnalysisRequest, run: { cryostatId: string }): Promise<Dataset | null> {
  if (!addendaDatasetId) return null
  const [row] = await tx.select({ dataset: datasets, run: runs }).from(datasets).innerJoin(runs, eq(runs.id, datasets.runId))
    .where(and(eq(datasets.id, addendaDatasetId), eq(datasets.role, 'addenda')))
  if (!row || !can(actor, 'dataset:read', { groupId: row.run.groupId })) throw new DomainError('invalid', 'These addenda are not there. Choose others, or upload them.', ['addendaDatasetId'])
  if (row.run.cryostatId !== run.cryostatId) throw new DomainError('invalid', 'These addenda were measured on another cryostat. Choose those of this one.', ['addendaDatasetId'])
  if (!row.dataset.temperatureK) throw new DomainError('conflict', 'The columns of the addenda are not confirmed yet. Confirm them first.', ['addendaDatasetId'])
  return row.dataset
}

/** Only a conversion that the engine itself suggests for these numbers can be accepted. */
function correctionOf(input: DatasetAnalysisInput, correctionId: string | null | undefined) {
  if (!correctionId) return null
  const suggestion = analyseDataset(input).suggestions.find(each => each.id === correctionId && each.factor !== 1)
  if (!suggestion) throw new DomainError('conflict', 'This correction is not suggested for these numbers any more. Look at the checks again.', ['correctionId'])
  return suggestion
}

function isSame(a: AnalysisLineage, b: AnalysisLineage): boolean {
  return a.curveSha256 === b.curveSha256 && a.addenda?.datasetId === b.addenda?.datasetId && a.correction?.id === b.correction?.id
    && a.windowK[0] === b.windowK[0] && a.windowK[1] === b.windowK[1] && a.engineVersion === b.engineVersion
    && JSON.stringify(Object.entries(a.mapping.sample ?? {}).sort()) === JSON.stringify(Object.entries(b.mapping.sample ?? {}).sort())
}

function sameTerms(a: readonly string[], b: readonly string[]): boolean {
  return a.length === b.length && a.every(term => b.includes(term))
}
