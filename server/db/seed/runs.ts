import { eq } from 'drizzle-orm'
import { handbookEntry } from '#shared/materials/elements'
import { cryostatPlanningFacts } from '#shared/planning/cryostat-facts'
import { estimateRun } from '#shared/planning/estimate'
import { expectedHeatCapacity } from '#shared/planning/measurement'
import type { FinishedRunFacts, RunEstimate } from '#shared/planning/types'
import { type Quote, quoteRun } from '#shared/pricing/quote'
import { cardInForce } from '#shared/pricing/rate-card'
import type { RunState } from '#shared/runs/states'
import type { Database } from '#server/db/client'
import { type cryostats, type rateCardPrices, runEntries, runs, runSamples, runTransitions } from '#server/db/schema'
import { inBatches } from './helium-books'
import type { SeededPeople } from './people'
import type { Random } from './random'
import type { SeededCard } from './rates'
import { writeLog } from './run-log'
import type { RunSpec } from './schedule'

type Cryostat = typeof cryostats.$inferSelect
type Prices = typeof rateCardPrices.$inferSelect
const DAY_MS = 86_400_000

/** What all runs of the seed share. */
export interface RunFacts {
  people: SeededPeople
  cryostats: Cryostat[]
  cards: SeededCard[]
  prices: Prices[]
  dewarIds: string[]
  now: Date
}

/** A run of the seed with its rows. */
export interface SeededRun { run: typeof runs.$inferSelect, spec: RunSpec, cryostat: Cryostat, group: SeededPeople['groups'][number], entries: (typeof runEntries.$inferSelect)[] }

/** Estimate, quote and payer of a run, as the plan page would have found them. */
function planRun(spec: RunSpec, facts: RunFacts, history: readonly FinishedRunFacts[]) {
  const cryostat = facts.cryostats.find(candidate => candidate.slug === spec.cryostat)!
  const group = facts.people.groups.find(candidate => candidate.id === spec.sample.groupId)!
  const card = cardInForce(facts.cards, new Date(Math.min(spec.startsAt.getTime(), facts.now.getTime())).toISOString().slice(0, 10))
  const prices = facts.prices.find(row => row.rateCardId === card.id && row.groupClass === group.class)!
  const { sample } = spec
  const known = handbookEntry(sample.formula)
  const estimate = estimateRun({
    cryostat: cryostatPlanningFacts(cryostat),
    sample: {
      label: sample.name, amountMol: sample.massMg / 1000 / sample.molarMassGPerMol,
      heatCapacityJPerMolK: expectedHeatCapacity({ gammaJPerMolK2: sample.gamma / 1000, debyeTemperatureK: known?.debyeTemperatureK ?? sample.debyeTemperatureK, atomsPerFormulaUnit: sample.atomsPerFormulaUnit }),
    },
    temperatureRangeK: [spec.temperatureLowK, spec.temperatureHighK], points: spec.points, nitrogenPrecool: cryostat.nitrogenPrecool, sweeps: 0,
  }, history)
  const quote = quoteRun(estimate, { prices, groupClass: group.class, reverseCharge: group.reverseCharge, depositPercent: card.depositPercent, sampleCount: 1, recoveryFraction: cryostat.recoveryFraction })
  return { cryostat, group, card, estimate, quote }
}

interface Timeline { askedAt: Date, approvedAt: Date, confirmedAt: Date }

function timelineOf(startsAt: Date, now: Date, random: Random): Timeline {
  const askedAt = new Date(Math.min(startsAt.getTime() - random.between(8, 40) * DAY_MS, now.getTime() - random.between(1, 4) * DAY_MS))
  const approvedAt = new Date(askedAt.getTime() + random.between(0.05, 0.9) * DAY_MS)
  return { askedAt, approvedAt, confirmedAt: new Date(approvedAt.getTime() + random.between(0.02, 0.08) * DAY_MS) }
}

/** Writes runs with their transitions, samples and run sheets; the newest are still going on. */
export async function seedRuns(db: Database, specs: (RunSpec & { state: RunState })[], facts: RunFacts, random: Random, history: readonly FinishedRunFacts[] = []): Promise<SeededRun[]> {
  const seeded: SeededRun[] = []
  const freeFrom = new Map<string, Date>()
  for (const spec of [...specs].sort((a, b) => a.startsAt.getTime() - b.startsAt.getTime())) {
    // Asked runs may compete; any other moves to the first morning on which the cryostat is free.
    const free = freeFrom.get(spec.cryostat)
    const startsAt = spec.state !== 'asked' && free && free > spec.startsAt ? morningAfter(free) : spec.startsAt
    if (spec.state === 'finished' && startsAt.getTime() > facts.now.getTime() - 10 * DAY_MS) continue
    const run = await seedRun(db, { ...spec, startsAt }, facts, random, history)
    seeded.push(run)
    if (spec.state !== 'asked') freeFrom.set(spec.cryostat, run.run.slot.endsAt)
  }
  return seeded
}

/** Seven in the morning (UTC) after a pause of six hours. */
function morningAfter(instant: Date): Date {
  const at = new Date(instant.getTime() + 6 * 3_600_000)
  if (at.getUTCHours() >= 7) at.setUTCDate(at.getUTCDate() + 1)
  at.setUTCHours(7, 0, 0, 0)
  return at
}

async function seedRun(db: Database, spec: RunSpec & { state: RunState }, facts: RunFacts, random: Random, history: readonly FinishedRunFacts[]): Promise<SeededRun> {
  const { cryostat, group, card, estimate, quote } = planRun(spec, facts, history)
  const times = timelineOf(spec.startsAt, facts.now, random)
  const plannedEnd = new Date(spec.startsAt.getTime() + Math.ceil(estimate.totalHours.likely) * 3_600_000)
  const values = rowOf(spec, { cryostat, group, card, estimate, quote, times, plannedEnd })
  const [first] = await db.insert(runs).values(values).returning()
  let run = first!
  const wasRun = ['running', 'finished', 'settled'].includes(spec.state)
  const log = wasRun
    ? writeLog({ runId: run.id, cryostat, estimate, temperatureLowK: spec.temperatureLowK, startsAt: spec.startsAt, until: facts.now, operatorIds: facts.people.operatorIds, dewarIds: facts.dewarIds, nitrogenPrecool: cryostat.nitrogenPrecool }, random)
    : null
  const entries: (typeof runEntries.$inferSelect)[] = []
  for (const batch of inBatches(log?.entries ?? [])) entries.push(...await db.insert(runEntries).values(batch).returning())
  if (log && spec.state !== 'running') run = await endRun(db, run, log.endsAt, spec, random)
  await db.insert(runSamples).values({ runId: run.id, sampleId: spec.sample.id })
  await db.insert(runTransitions).values(transitionsOf(run, spec, times, facts, log?.endsAt ?? null))
  return { run, spec, cryostat, group, entries }
}

function rowOf(spec: RunSpec & { state: RunState }, plan: { cryostat: Cryostat, group: SeededPeople['groups'][number], card: SeededCard, estimate: RunEstimate, quote: Quote, times: Timeline, plannedEnd: Date }): typeof runs.$inferInsert {
  const { cryostat, group, card, estimate, quote, times, plannedEnd } = plan
  return {
    title: spec.sample.title, cryostatId: cryostat.id, groupId: group.id, requestedBy: group.memberId,
    // A past run is written as running first and ended below, by the steps the database allows.
    state: spec.state === 'finished' || spec.state === 'settled' ? 'running' : spec.state,
    slot: { startsAt: spec.startsAt, endsAt: plannedEnd },
    planInput: { temperatureLowK: spec.temperatureLowK, temperatureHighK: spec.temperatureHighK, points: spec.points, nitrogenPrecool: cryostat.nitrogenPrecool, sweeps: 0 },
    estimate, quote: { ...quote, lockedUntil: new Date(times.askedAt.getTime() + 14 * DAY_MS).toISOString() }, rateCardId: card.id,
    costCode: group.costCodes[0] ?? null, purchaseOrder: group.class === 'industry' ? `PO-${1000 + (times.askedAt.getTime() / DAY_MS | 0) % 9000}` : null,
    payBy: group.class === 'internal' || spec.state === 'asked' ? null : new Date(times.approvedAt.getTime() + 3 * DAY_MS),
    startedAt: ['running', 'finished', 'settled'].includes(spec.state) ? spec.startsAt : null,
    createdAt: times.askedAt,
  }
}

async function endRun(db: Database, run: typeof runs.$inferSelect, endsAt: Date, spec: RunSpec, random: Random) {
  const [ended] = await db.update(runs).set({
    state: 'finished', finishedAt: endsAt, cutShort: spec.cutShort, operatorHours: Number((3.5 + random.between(0, 2)).toFixed(1)), slot: { startsAt: run.slot.startsAt, endsAt: new Date(Math.max(endsAt.getTime(), run.slot.startsAt.getTime() + 3_600_000)) },
  }).where(eq(runs.id, run.id)).returning()
  return ended!
}

function transitionsOf(run: typeof runs.$inferSelect, spec: RunSpec & { state: RunState }, times: Timeline, facts: RunFacts, endsAt: Date | null): (typeof runTransitions.$inferInsert)[] {
  const { managerId, operatorIds } = facts.people
  const steps: { toState: RunState, at: Date, actorId: string | null, reason?: string }[] = [
    { toState: 'asked', at: times.askedAt, actorId: run.requestedBy },
    { toState: 'approved', at: times.approvedAt, actorId: managerId },
    { toState: 'confirmed', at: times.confirmedAt, actorId: null, reason: run.costCode ? `Cost code ${run.costCode}` : 'The deposit was paid.' },
    { toState: 'running', at: spec.startsAt, actorId: operatorIds[0]! },
    { toState: 'finished', at: endsAt ?? run.slot.endsAt, actorId: operatorIds[1]!, reason: spec.cutShort ? 'The pump of the sample pot failed; the points above 8 K are missing.' : '' },
  ]
  const order: RunState[] = ['asked', 'approved', 'confirmed', 'running', 'finished']
  const reached = order.indexOf(spec.state === 'settled' ? 'finished' : spec.state)
  return steps.slice(0, reached + 1).map((step, index) => ({ runId: run.id, fromState: steps[index - 1]?.toState ?? null, reason: '', ...step }))
}
