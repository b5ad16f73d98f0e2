import { and, eq, inArray, sql } from 'drizzle-orm'
import type { Actor } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import { paysDeposit } from '#shared/pricing/rate-card'
import { HOLDING_STATES } from '#shared/runs/states'
import { checkAskable, type Slot } from '#shared/runs/slot'
import type { RunAsk } from '#shared/schemas/run'
import type { Database } from '#server/db/client'
import { closures, cryostatHolds, runs, runSamples, runTransitions } from '#server/db/schema'
import { writeAudit } from '#server/services/audit/write-audit'
import { estimatePlan, type PlannedRun } from '#server/services/plan/estimate-plan'
import type { Run } from './change-state'

/** What already holds the days of a slot. */
export interface SlotConflict { kind: 'run' | 'closure', startsAt: Date, endsAt: Date, label: string }

/**
 * What holds a cryostat within a slot: runs and closures, named by number or reason only.
 *
 * @param db database or transaction
 * @param cryostatId the cryostat
 * @param slot the days wanted
 */
export async function findSlotConflicts(db: Database, cryostatId: string, slot: Slot): Promise<SlotConflict[]> {
  const rows = await db.select({ during: cryostatHolds.during, number: runs.number, reason: closures.reason }).from(cryostatHolds)
    .leftJoin(runs, eq(runs.id, cryostatHolds.runId)).leftJoin(closures, eq(closures.id, cryostatHolds.closureId))
    .where(and(eq(cryostatHolds.cryostatId, cryostatId), sql`${cryostatHolds.during} && tstzrange(${slot.startsAt.toISOString()}::timestamptz, ${slot.endsAt.toISOString()}::timestamptz)`))
  return rows.map(row => ({ kind: row.number === null ? 'closure' : 'run', ...row.during, label: row.number === null ? row.reason ?? 'closed' : `run ${String(row.number).padStart(4, '0')}` }))
}

/** Requests that compete for the days of a slot. */
export async function countCompeting(db: Database, cryostatId: string, slot: Slot): Promise<number> {
  const [row] = await db.select({ count: sql<number>`count(*)::int` }).from(runs)
    .where(and(eq(runs.cryostatId, cryostatId), eq(runs.state, 'asked'), sql`${runs.slot} && tstzrange(${slot.startsAt.toISOString()}::timestamptz, ${slot.endsAt.toISOString()}::timestamptz)`))
  return row?.count ?? 0
}

/** The slot of a planned run: its likely hours from the start. */
export function slotOf(startsAt: Date, planned: Pick<PlannedRun, 'estimate'>): Slot {
  return { startsAt, endsAt: new Date(startsAt.getTime() + Math.ceil(planned.estimate.totalHours.likely) * 3_600_000) }
}

/**
 * Asks for days. The estimate and quote are computed again here, so that what is kept is what the server found.
 * Sent twice with the same key, it asks once.
 *
 * @param db database
 * @param input the plan with its start, who asks, and the instant
 * @returns the run as asked for
 * @throws DomainError naming the field, or `conflict` naming what holds the days
 */
export async function askForRun(db: Database, input: { ask: RunAsk, actor: Actor, now: Date }): Promise<Run> {
  const { ask, actor, now } = input
  const [repeat] = await db.select().from(runs).where(and(eq(runs.clientKey, ask.clientKey), eq(runs.requestedBy, actor.personId)))
  const planned = await estimatePlan(db, { plan: ask, actor, now })
  if (repeat) return repeat
  const slot = slotOf(ask.startsAt, planned)
  checkAskable(slot, now)
  checkPayer(ask, planned)
  return db.transaction(async (tx) => {
    const [conflict] = await findSlotConflicts(tx, planned.cryostat.id, slot)
    if (conflict) {
      throw new DomainError('conflict', `${planned.cryostat.name} is held by ${conflict.label} in these days. Choose a start from which the whole run fits.`, ['startsAt'])
    }
    const [run] = await tx.insert(runs).values({
      title: ask.title, cryostatId: planned.cryostat.id, groupId: ask.groupId, requestedBy: actor.personId, state: 'asked', slot,
      planInput: { temperatureLowK: ask.temperatureLowK, temperatureHighK: ask.temperatureHighK, points: ask.points, nitrogenPrecool: ask.nitrogenPrecool, sweeps: ask.sweeps },
      estimate: planned.estimate, rateCardId: planned.rateCard.id, costCode: ask.costCode || null, purchaseOrder: ask.purchaseOrder || null, clientKey: ask.clientKey,
      quote: { ...planned.quote, lockedUntil: new Date(now.getTime() + planned.facility.quoteLockDays * 86_400_000).toISOString() },
    }).onConflictDoNothing({ target: runs.clientKey }).returning()
    if (!run) {
      const [first] = await tx.select().from(runs).where(eq(runs.clientKey, ask.clientKey))
      return first!
    }
    await tx.insert(runSamples).values([...new Set(ask.sampleIds)].map(sampleId => ({ runId: run.id, sampleId })))
    await tx.insert(runTransitions).values({ runId: run.id, fromState: null, toState: 'asked', actorId: actor.personId, at: now })
    await writeAudit(tx, { actorId: actor.personId, action: 'run:ask', objectType: 'run', objectId: run.id })
    return run
  })
}

function checkPayer(ask: RunAsk, { group }: PlannedRun) {
  if (paysDeposit(group.class)) return
  if (!ask.costCode) throw new DomainError('invalid', 'Internal groups book on a cost code. Choose one.', ['costCode'])
  if (!group.costCodes.includes(ask.costCode)) throw new DomainError('invalid', `${ask.costCode} is not a cost code of ${group.name}. Choose one of ${group.costCodes.join(', ')}.`, ['costCode'])
}

/** Runs of a group that hold or used days in a year, with their likely totals; what counts against its cap. */
export async function committedMinor(db: Database, groupId: string, year: number, exceptRunId?: string): Promise<number> {
  const states = [...HOLDING_STATES, 'finished', 'settled'] as const
  const rows = await db.select({ id: runs.id, quote: runs.quote, slot: runs.slot }).from(runs).where(and(eq(runs.groupId, groupId), inArray(runs.state, [...states])))
  return rows.filter(row => row.id !== exceptRunId && row.slot.startsAt.getUTCFullYear() === year).reduce((sum, row) => sum + row.quote.totalMinor.likely, 0)
}
