import { and, desc, eq, inArray, lt, or, sql, type SQL } from 'drizzle-orm'
import { type Actor, can, hasFacilityRole } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import { canStep } from '#shared/runs/transition'
import { RUN_STATES, type RunState } from '#shared/runs/states'
import type { RunDetail, RunList, RunListItem } from '#shared/types/runs'
import type { Database } from '#server/db/client'
import { cryostats, groups, invoices, payments, people, runs, runSamples, runTransitions, samples } from '#server/db/schema'
import { authorise } from '#server/services/access/authorise'
import { readFacility } from '#server/services/facility/queries'
import { sharedRead } from '#server/utils/shared-read'

const PAGE_SIZE = 50

const sampleNames = sql<string>`coalesce((select string_agg(${samples.name}, ', ' order by ${samples.name}) from ${runSamples} join ${samples} on ${samples.id} = ${runSamples.sampleId} where ${runSamples.runId} = ${runs.id}), '')`

const listColumns = {
  id: runs.id, number: runs.number, title: runs.title, state: runs.state, cutShort: runs.cutShort, cryostat: cryostats.name, group: groups.name, slot: runs.slot, payBy: runs.payBy, samples: sampleNames,
}

type ListRow = Omit<RunListItem, 'startsAt' | 'endsAt' | 'payBy'> & { slot: { startsAt: Date, endsAt: Date }, payBy: Date | null }

function toListItem({ slot, payBy, ...row }: ListRow): RunListItem {
  return { ...row, startsAt: slot.startsAt.toISOString(), endsAt: slot.endsAt.toISOString(), payBy: payBy?.toISOString() ?? null }
}

/** Runs an actor may see: all for facility roles, those of their groups for others. */
function visibleTo(actor: Actor): SQL | undefined {
  if (hasFacilityRole(actor)) return undefined
  const groupIds = actor.memberships.map(({ groupId }) => groupId)
  return groupIds.length > 0 ? inArray(runs.groupId, groupIds) : sql`false`
}

/**
 * A page of runs, newest number first.
 *
 * @param db database
 * @param input who asks, states to narrow to (comma-separated), and the number to go on from
 */
export function listRuns(db: Database, input: RunListRequest): Promise<RunList> {
  const { actor } = input
  // What is loaded is narrowed to what the actor may read.
  authorise(actor, 'run:read', { groupId: actor.memberships[0]?.groupId })
  return sharedList(db, input)
}

interface RunListRequest { actor: Actor, state?: string, cursor?: string }

const sharedList = sharedRead(JSON.stringify, async (db: Database, { actor, state, cursor }: RunListRequest): Promise<RunList> => {
  const states = (state?.split(',') ?? []).filter((word): word is RunState => (RUN_STATES as readonly string[]).includes(word))
  const before = Number(cursor)
  const rows = await db.select(listColumns).from(runs)
    .innerJoin(cryostats, eq(cryostats.id, runs.cryostatId)).innerJoin(groups, eq(groups.id, runs.groupId))
    .where(and(visibleTo(actor), states.length > 0 ? inArray(runs.state, states) : undefined, cursor && Number.isInteger(before) ? lt(runs.number, before) : undefined))
    .orderBy(desc(runs.number)).limit(PAGE_SIZE + 1)
  const items = rows.slice(0, PAGE_SIZE).map(toListItem)
  const { timeZone } = await readFacility(db)
  return { items, nextCursor: rows.length > PAGE_SIZE ? String(items.at(-1)?.number) : null, timeZone }
})

/**
 * A run with everything its page shows, redacted to what the actor may see.
 *
 * @param db database
 * @param input which run, and who asks
 * @throws DomainError `not-found` for a run that is not there or not theirs
 */
export async function readRun(db: Database, input: RunRequest): Promise<RunDetail> {
  const run = await sharedRun(db, input)
  authorise(input.actor, 'run:read', { groupId: run.groupId })
  return run
}

interface RunRequest { runId: string, actor: Actor }

const sharedRun = sharedRead(JSON.stringify, async (db: Database, { runId, actor }: RunRequest): Promise<RunDetail> => {
  const [row] = await db.select({
    run: runs, list: listColumns, groupClass: groups.class, cryostatSlug: cryostats.slug, usesLiquid: cryostats.usesLiquid, requestedBy: people.name,
  }).from(runs).innerJoin(cryostats, eq(cryostats.id, runs.cryostatId)).innerJoin(groups, eq(groups.id, runs.groupId)).innerJoin(people, eq(people.id, runs.requestedBy))
    .where(eq(runs.id, runId))
  authorise(actor, 'run:read', row ? { groupId: row.run.groupId } : {})
  if (!row) throw new DomainError('not-found', 'There is no such run. Look for it under Runs.')
  const { run } = row
  const facility = await readFacility(db)
  const [sampleList, steps, paymentRows, [invoice]] = [
    await db.select({ id: samples.id, name: samples.name, formula: samples.formula, hazards: samples.hazards }).from(runSamples).innerJoin(samples, eq(samples.id, runSamples.sampleId)).where(eq(runSamples.runId, runId)),
    await db.select({ from: runTransitions.fromState, to: runTransitions.toState, by: people.name, reason: runTransitions.reason, at: runTransitions.at }).from(runTransitions)
      .leftJoin(people, eq(people.id, runTransitions.actorId)).where(eq(runTransitions.runId, runId)).orderBy(runTransitions.id),
    await db.select().from(payments).where(eq(payments.runId, runId)).orderBy(payments.createdAt),
    await db.select({ id: invoices.id, number: invoices.number }).from(invoices).where(and(eq(invoices.runId, runId), eq(invoices.kind, 'invoice'))),
  ]
  const object = { groupId: run.groupId, ownerId: run.requestedBy }
  const seesPrices = can(actor, 'run:pay', object) || actor.isManager
  return {
    ...toListItem(row.list),
    timeZone: facility.timeZone, currency: facility.currency, groupId: run.groupId, groupClass: row.groupClass, cryostatSlug: row.cryostatSlug, usesLiquid: row.usesLiquid,
    requestedBy: row.requestedBy, isOwn: run.requestedBy === actor.personId, startedAt: run.startedAt?.toISOString() ?? null, finishedAt: run.finishedAt?.toISOString() ?? null,
    costCode: run.costCode, purchaseOrder: run.purchaseOrder, planInput: run.planInput, estimate: run.estimate, quote: seesPrices ? run.quote : null,
    sampleList,
    transitions: steps.map(step => ({ ...step, at: step.at.toISOString() })),
    payments: seesPrices ? paymentRows.map(({ kind, state, amountMinor, settledAt, createdAt, failure, actionUrl }) => ({ kind, state, amountMinor, at: (settledAt ?? createdAt).toISOString(), failure, actionUrl })) : [],
    invoice: invoice && can(actor, 'invoice:read', object) ? invoice : null,
    may: {
      approve: can(actor, 'run:approve', object) && canStep(run.state, 'approve'),
      decline: can(actor, 'run:decline', object) && canStep(run.state, 'decline'),
      withdraw: can(actor, 'run:withdraw', object) && canStep(run.state, 'withdraw'),
      pay: can(actor, 'run:pay', object) && run.state === 'approved' && run.quote.depositMinor > 0,
      start: can(actor, 'run:advance', object) && canStep(run.state, 'start'),
      log: can(actor, 'run:log', object) && run.state === 'running',
      finish: can(actor, 'run:finish', object) && canStep(run.state, 'finish'),
      upload: can(actor, 'dataset:upload', object) && ['running', 'finished', 'settled'].includes(run.state),
    },
  }
})

/** Runs in a state, for lists of the desk and of today. */
export async function listRunsInStates(db: Database, states: RunState[], condition?: SQL): Promise<RunListItem[]> {
  const rows = await db.select(listColumns).from(runs).innerJoin(cryostats, eq(cryostats.id, runs.cryostatId)).innerJoin(groups, eq(groups.id, runs.groupId))
    .where(and(or(...states.map(state => eq(runs.state, state))), condition)).orderBy(sql`lower(${runs.slot})`)
  return rows.map(toListItem)
}
