import { and, desc, eq, ilike, inArray, isNotNull, isNull, lt, or, sql, type SQL } from 'drizzle-orm'
import { type Actor, hasFacilityRole } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import type { ResultListQuery } from '#shared/schemas/results'
import type { ResultList, ResultListItem } from '#shared/types/results'
import type { Database } from '#server/db/client'
import { analyses, cryostats, datasets, groups, runs, samples, signOffs } from '#server/db/schema'
import { authorise } from '#server/services/access/authorise'
import { readFacility } from '#server/services/facility/queries'

const PAGE_SIZE = 50
// A cursor carries milliseconds; the database keeps microseconds.
const uploadedAt = sql<Date>`date_trunc('milliseconds', ${datasets.createdAt})`

interface NumberWithError { value: number, standardError: number }

/**
 * Datasets with the verdict of their newest analysis, newest upload first.
 *
 * @param db database
 * @param query filters and cursor, and who asks; people without a facility role see their own groups' results
 * @throws DomainError `invalid` for a cursor that is not ours
 */
export async function listResults(db: Database, query: ResultListQuery & { actor: Actor }): Promise<ResultList> {
  const { actor } = query
  const groupIds = actor.memberships.map(({ groupId }) => groupId)
  if (hasFacilityRole(actor) || groupIds.length === 0) authorise(actor, 'dataset:read')
  for (const groupId of groupIds) authorise(actor, 'dataset:read', { groupId })

  const latest = db.select({ analysisId: analyses.id, verdict: analyses.verdict, createdAt: sql<Date>`${analyses.createdAt}`.mapWith(analyses.createdAt).as('analysed_at') })
    .from(analyses).where(eq(analyses.datasetId, datasets.id)).orderBy(desc(analyses.createdAt), desc(analyses.id)).limit(1).as('latest')
  const accepted = db.select({ accepted: signOffs.accepted }).from(signOffs).where(eq(signOffs.analysisId, latest.analysisId)).orderBy(desc(signOffs.at), desc(signOffs.id)).limit(1).as('signed')

  const conditions: (SQL | undefined)[] = [
    hasFacilityRole(actor) ? undefined : inArray(runs.groupId, groupIds),
    query.runId ? eq(datasets.runId, query.runId) : undefined,
    query.verdict === 'none' ? isNull(latest.analysisId) : query.verdict ? eq(latest.verdict, query.verdict) : undefined,
    query.signed === 'yes' ? isNotNull(accepted.accepted) : query.signed === 'no' ? isNull(accepted.accepted) : undefined,
    query.search ? matches(query.search) : undefined,
    query.cursor ? before(query.cursor) : undefined,
  ]
  const rows = await db.select({
    dataset: { id: datasets.id, role: datasets.role, originalName: datasets.originalName, createdAt: datasets.createdAt, mapped: sql<boolean>`${datasets.mapping} is not null`, pointCount: sql<number | null>`cardinality(${datasets.temperatureK})` },
    run: { id: runs.id, number: runs.number },
    cryostatName: cryostats.name,
    groupName: groups.name,
    sample: { name: samples.name, formula: samples.formula },
    mappedFormula: sql<string | null>`${datasets.mapping} #>> '{sample,formula}'`,
    latest: { analysisId: latest.analysisId, verdict: latest.verdict, createdAt: latest.createdAt },
    accepted: accepted.accepted,
  }).from(datasets)
    .innerJoin(runs, eq(runs.id, datasets.runId)).innerJoin(cryostats, eq(cryostats.id, runs.cryostatId)).innerJoin(groups, eq(groups.id, runs.groupId))
    .leftJoin(samples, eq(samples.id, datasets.sampleId)).leftJoinLateral(latest, sql`true`).leftJoinLateral(accepted, sql`true`)
    .where(and(...conditions)).orderBy(desc(uploadedAt), desc(datasets.id)).limit(PAGE_SIZE + 1)

  const page = rows.slice(0, PAGE_SIZE)
  const last = page.at(-1)?.dataset
  const numbers = await numbersOf(db, page.flatMap(row => row.latest?.analysisId ?? []))
  const { timeZone } = await readFacility(db)
  return {
    timeZone,
    items: page.map(({ dataset, run, cryostatName, groupName, sample, mappedFormula, latest, accepted }): ResultListItem => ({
      datasetId: dataset.id, role: dataset.role, originalName: dataset.originalName, runId: run.id, runNumber: run.number, cryostatName, groupName,
      sampleName: sample?.name ?? null, formula: mappedFormula ?? sample?.formula ?? null,
      uploadedAt: dataset.createdAt.toISOString(), mapped: dataset.mapped, pointCount: dataset.pointCount,
      latest: latest?.analysisId ? { ...numbers.get(latest.analysisId)!, analysisId: latest.analysisId, verdict: latest.verdict, createdAt: latest.createdAt.toISOString(), signed: accepted === null ? null : accepted ? 'accepted' : 'refused' } : null,
    })),
    nextCursor: rows.length > PAGE_SIZE && last ? `${last.createdAt.toISOString()}_${last.id}` : null,
  }
}

/** The few numbers that the list shows; a stored result also holds a residual for every point, so only those of one page are opened. */
async function numbersOf(db: Database, analysisIds: string[]): Promise<Map<string, Pick<NonNullable<ResultListItem['latest']>, 'checkCounts' | 'gamma' | 'debyeTemperatureK'>>> {
  if (analysisIds.length === 0) return new Map()
  const rows = await db.select({
    id: analyses.id,
    gamma: sql<NumberWithError | null>`${analyses.result} #> '{fit,coefficients,gamma}'`,
    debye: sql<NumberWithError | null>`${analyses.result} #> '{fit,debyeTemperature}'`,
    statuses: sql<string[]>`jsonb_path_query_array(${analyses.result}, '$.checks[*].status')`,
  }).from(analyses).where(inArray(analyses.id, analysisIds))
  return new Map(rows.map(({ id, gamma, debye, statuses }) => {
    const count = (status: string) => statuses.filter(each => each === status).length
    return [id, { checkCounts: { ok: count('ok'), caution: count('caution'), fail: count('fail') }, gamma: numberOf(gamma), debyeTemperatureK: numberOf(debye) }]
  }))
}

/** A stored estimate without its unit. */
function numberOf(estimate: NumberWithError | null): NumberWithError | null {
  return estimate ? { value: estimate.value, standardError: estimate.standardError } : null
}

function matches(search: string): SQL | undefined {
  const pattern = `%${search.replace(/[\\%_]/g, '\\$&')}%`
  return or(ilike(datasets.originalName, pattern), ilike(samples.name, pattern), ilike(samples.formula, pattern), ilike(runs.title, pattern), ilike(cryostats.name, pattern), sql`${runs.number}::text = ${search.replace(/^0+/, '')}`)
}

/** Rows after the cursor `<instant>_<id>` of the last row seen. */
function before(cursor: string): SQL | undefined {
  const [instant = '', id = ''] = cursor.split('_')
  const at = new Date(instant)
  if (Number.isNaN(at.getTime()) || !/^[0-9a-f-]{36}$/.test(id)) throw new DomainError('invalid', 'This page of the list is not known. Start again from the first page.', ['cursor'])
  const instantParameter = sql`${at.toISOString()}::timestamptz`
  return or(sql`${uploadedAt} < ${instantParameter}`, and(sql`${uploadedAt} = ${instantParameter}`, lt(datasets.id, id)))
}
