import { and, asc, desc, eq, getTableColumns, isNotNull, ne, sql } from 'drizzle-orm'
import { type Actor, can } from '#shared/access/rules'
import { lastStandardReading } from '#shared/heat-capacity/copper-standard'
import type { AnalysisSummary, CurvePoints, DatasetView, SampleChoice } from '#shared/types/results'
import type { Database } from '#server/db/client'
import { analyses, cryostats, datasets, groups, people, runSamples, runs, samples, signOffs } from '#server/db/schema'
import { authorise } from '#server/services/access/authorise'
import { readFacility } from '#server/services/facility/queries'
import { sharedRead } from '#server/utils/shared-read'
import { copperHistory } from './copper-history'
import { unpackRows } from './packed-rows'
import { datasetFor } from './run-of'

/**
 * A dataset with everything its page needs but the points, which may be half a million.
 *
 * @param db database
 * @param request which dataset and who asks
 * @throws DomainError `not-found` when the actor may not see it
 */
export async function getDataset(db: Database, request: DatasetRequest): Promise<DatasetView> {
  const { view, groupId } = await sharedDataset(db, request)
  authorise(request.actor, 'dataset:read', { groupId })
  return view
}

interface DatasetRequest { datasetId: string, actor: Actor }

const sharedDataset = sharedRead(JSON.stringify, async (db: Database, { datasetId, actor }: DatasetRequest): Promise<{ view: DatasetView, groupId: string }> => {
  const { run } = await datasetFor(db, datasetId, actor, 'dataset:read')
  const { temperatureK: _, heatCapacity: __, sigma: ___, mapping: ____, ...columns } = getTableColumns(datasets)
  const [row] = await db.select({
    ...columns,
    mapping: sql<DatasetView['mapping']>`${datasets.mapping} - 'rowNumbers'`,
    pointCount: sql<number | null>`cardinality(${datasets.temperatureK})`,
    uploadedByName: people.name, cryostatName: cryostats.name, groupName: groups.name, sampleName: samples.name,
  }).from(datasets).innerJoin(people, eq(people.id, datasets.uploadedBy)).innerJoin(runs, eq(runs.id, datasets.runId))
    .innerJoin(cryostats, eq(cryostats.id, runs.cryostatId)).innerJoin(groups, eq(groups.id, runs.groupId)).leftJoin(samples, eq(samples.id, datasets.sampleId))
    .where(eq(datasets.id, datasetId))
  const dataset = row!
  const { timeZone, checkThresholds } = await readFacility(db)
  const readings = await copperHistory(db, run.cryostatId)
  const earlier = readings.filter(reading => reading.datasetId !== datasetId).map(reading => ({ ...reading, at: new Date(reading.at) }))
  const may = (action: 'dataset:upload' | 'analysis:write' | 'analysis:sign') => can(actor, action, { groupId: run.groupId })
  const view: DatasetView = {
    id: dataset.id, role: dataset.role, originalName: dataset.originalName, bytes: dataset.bytes, sha256: dataset.sha256,
    uploadedAt: dataset.createdAt.toISOString(), uploadedByName: dataset.uploadedByName, timeZone,
    run: { id: run.id, number: run.number, title: run.title, cryostatName: dataset.cryostatName, startsAt: run.slot.startsAt.toISOString(), endsAt: run.slot.endsAt.toISOString(), groupName: dataset.groupName },
    sampleId: dataset.sampleId, sampleName: dataset.sampleName,
    sampleChoices: await samplesOf(db, run.id),
    mapping: dataset.mapping, rejectedRows: dataset.rejectedRows, pointCount: dataset.pointCount,
    analyses: await analysesOf(db, datasetId),
    addendaChoices: await addendaOf(db, run.groupId, run.cryostatId, datasetId),
    copperStandard: lastStandardReading(earlier, dataset.createdAt) ?? null,
    copperHistory: dataset.role === 'copper-standard' ? readings : [],
    checkThresholds,
    may: { map: may('dataset:upload'), analyse: may('analysis:write'), sign: may('analysis:sign') },
  }
  return { view, groupId: run.groupId }
})

/**
 * The points of a mapped dataset.
 *
 * @param db database
 * @param request which dataset and who asks
 * @returns temperatures in K, heat capacities and sigmas in mJ/(mol K); null before the columns are confirmed
 */
export async function getPoints(db: Database, request: { datasetId: string, actor: Actor }): Promise<CurvePoints | null> {
  const { dataset } = await datasetFor(db, request.datasetId, request.actor, 'dataset:read')
  const { temperatureK, heatCapacity, sigma, mapping } = dataset
  return temperatureK && heatCapacity ? { temperatureK, heatCapacity, sigma, rowNumbers: unpackRows(mapping?.rowNumbers, temperatureK.length) ?? null } : null
}

async function samplesOf(db: Database, runId: string): Promise<SampleChoice[]> {
  const { id, name, formula, kind, massMg, massUncertaintyMg, densityGPerCm3, conductionElectrons, criticalTemperatureK } = getTableColumns(samples)
  return db.select({ id, name, formula, kind, massMg, massUncertaintyMg, densityGPerCm3, conductionElectrons, criticalTemperatureK })
    .from(samples).innerJoin(runSamples, eq(runSamples.sampleId, samples.id)).where(eq(runSamples.runId, runId)).orderBy(asc(samples.name))
}

async function analysesOf(db: Database, datasetId: string): Promise<AnalysisSummary[]> {
  const signed = db.select({ accepted: signOffs.accepted }).from(signOffs).where(eq(signOffs.analysisId, analyses.id)).orderBy(desc(signOffs.at), desc(signOffs.id)).limit(1).as('signed')
  const at = (path: string) => sql`${analyses.result} #> ${path}::text[]`
  const rows = await db.select({
    id: analyses.id, createdAt: analyses.createdAt, createdByName: people.name, verdict: analyses.verdict,
    windowK: sql<[number, number]>`${at('{fit,model,windowK}')}`, terms: sql<string[]>`${at('{fit,model,terms}')}`,
    gamma: sql<AnalysisSummary['gamma']>`${at('{fit,coefficients,gamma}')}`, debyeTemperatureK: sql<AnalysisSummary['gamma']>`${at('{fit,debyeTemperature}')}`,
    accepted: signed.accepted,
  }).from(analyses).innerJoin(people, eq(people.id, analyses.createdBy)).leftJoinLateral(signed, sql`true`)
    .where(eq(analyses.datasetId, datasetId)).orderBy(desc(analyses.createdAt), desc(analyses.id))
  return rows.map(({ accepted, createdAt, ...rest }) => ({ ...rest, createdAt: createdAt.toISOString(), signed: accepted === null ? null : accepted ? 'accepted' : 'refused' }))
}

/** Addenda belong to a cryostat's holder; those of other groups stay theirs. */
async function addendaOf(db: Database, groupId: string, cryostatId: string, datasetId: string): Promise<DatasetView['addendaChoices']> {
  const rows = await db.select({ id: datasets.id, originalName: datasets.originalName, runNumber: runs.number, createdAt: datasets.createdAt })
    .from(datasets).innerJoin(runs, eq(runs.id, datasets.runId))
    .where(and(eq(datasets.role, 'addenda'), isNotNull(datasets.temperatureK), eq(runs.cryostatId, cryostatId), eq(runs.groupId, groupId), ne(datasets.id, datasetId)))
    .orderBy(desc(datasets.createdAt)).limit(20)
  return rows.map(({ createdAt, ...rest }) => ({ ...rest, uploadedAt: createdAt.toISOString() }))
}
