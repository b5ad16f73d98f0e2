import { sql } from 'drizzle-orm'
import { bigint, boolean, check, doublePrecision, index, integer, jsonb, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core'
import { createdAt, id, instant, span } from '../columns'
import { cryostats } from './facility'
import { rateCards } from './money'
import { groups, people } from './people'
import { samples } from './samples'
import type { PhaseId, RunEstimate } from '#shared/planning/types'
import type { Quote } from '#shared/pricing/quote'
import type { RunState } from '#shared/runs/states'

/** What was asked of planning, kept with the run. */
export interface RunPlanInput {
  temperatureLowK: number
  temperatureHighK: number
  points: number
  nitrogenPrecool: boolean
  sweeps: number
}

/** The quote as offered, locked to its rate card until an instant (ISO 8601). */
export type QuoteRecord = Quote & { lockedUntil: string }

/** The run: one visit of one or more samples to one cryostat, from plan to bill. */
export const runs = pgTable('runs', {
  id: id(),
  number: integer('number').generatedAlwaysAsIdentity().notNull().unique(),
  title: text('title').notNull(),
  cryostatId: uuid('cryostat_id').notNull().references(() => cryostats.id),
  groupId: uuid('group_id').notNull().references(() => groups.id),
  requestedBy: uuid('requested_by').notNull().references(() => people.id),
  state: text('state').$type<RunState>().notNull(),
  /** Raised by every transition; a stale writer finds no row. */
  version: integer('version').notNull().default(1),
  slot: span('slot').notNull(),
  planInput: jsonb('plan_input').$type<RunPlanInput>().notNull(),
  /** As it stood when the run was asked for; later learning does not change it. */
  estimate: jsonb('estimate').$type<RunEstimate>().notNull(),
  quote: jsonb('quote').$type<QuoteRecord>().notNull(),
  rateCardId: uuid('rate_card_id').notNull().references(() => rateCards.id),
  costCode: text('cost_code'),
  purchaseOrder: text('purchase_order'),
  payBy: instant('pay_by'),
  startedAt: instant('started_at'),
  finishedAt: instant('finished_at'),
  cutShort: boolean('cut_short').notNull().default(false),
  /** Hours of an operator, as entered when the run was finished. */
  operatorHours: doublePrecision('operator_hours'),
  /** The browser's key of the request, so that pressing twice asks once. */
  clientKey: uuid('client_key').unique(),
  createdAt: createdAt(),
}, table => [
  index('runs_cryostat_state').on(table.cryostatId, table.state),
  index('runs_group').on(table.groupId),
  index('runs_state').on(table.state),
  index('runs_slot').using('gist', table.slot),
  check('runs_state', sql`${table.state} in ('draft', 'asked', 'approved', 'confirmed', 'running', 'finished', 'settled', 'declined', 'withdrawn', 'lapsed')`),
  check('runs_slot_bounded', sql`not isempty(${table.slot}) and not lower_inf(${table.slot}) and not upper_inf(${table.slot})`),
])

export const runSamples = pgTable('run_samples', {
  runId: uuid('run_id').notNull().references(() => runs.id),
  sampleId: uuid('sample_id').notNull().references(() => samples.id),
}, table => [primaryKey({ columns: [table.runId, table.sampleId] })])

/** Every change of state, kept for ever (append-only by trigger). */
export const runTransitions = pgTable('run_transitions', {
  id: bigint('id', { mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
  runId: uuid('run_id').notNull().references(() => runs.id),
  fromState: text('from_state').$type<RunState>(),
  toState: text('to_state').$type<RunState>().notNull(),
  actorId: uuid('actor_id').references(() => people.id),
  reason: text('reason').notNull().default(''),
  at: instant('at').notNull().defaultNow(),
}, table => [index('run_transitions_run').on(table.runId)])

export const RUN_ENTRY_KINDS = ['phase', 'level', 'transfer', 'temperature', 'gas-meter', 'note'] as const
export type RunEntryKind = (typeof RUN_ENTRY_KINDS)[number]

/** One line of the run sheet. Only the columns of its kind are filled; readings at 1 Hz will have a table of their own. */
export const runEntries = pgTable('run_entries', {
  id: id(),
  runId: uuid('run_id').notNull().references(() => runs.id),
  kind: text('kind').$type<RunEntryKind>().notNull(),
  at: instant('at').notNull(),
  recordedBy: uuid('recorded_by').references(() => people.id),
  recordedAt: instant('recorded_at').notNull().defaultNow(),
  clientKey: uuid('client_key').notNull().unique(),
  phase: text('phase').$type<PhaseId>(),
  levelPercent: doublePrecision('level_percent'),
  liquidLitres: doublePrecision('liquid_litres'),
  boilOffLitresPerHour: doublePrecision('boil_off_litres_per_hour'),
  outsideUsual: boolean('outside_usual').notNull().default(false),
  /** Transfers: when the flow began, which dewar gave how much, and what the vessel held before; `liquidLitres` is what it held after. */
  startedAt: instant('started_at'),
  fromAccountId: uuid('from_account_id'),
  drawnLitres: doublePrecision('drawn_litres'),
  beforeLitres: doublePrecision('before_litres'),
  temperatureK: doublePrecision('temperature_k'),
  gasMeterM3: doublePrecision('gas_meter_m3'),
  note: text('note').notNull().default(''),
}, table => [
  index('run_entries_run_at').on(table.runId, table.at),
  check('run_entries_kind', sql`${table.kind} in ('phase', 'level', 'transfer', 'temperature', 'gas-meter', 'note')`),
  check('run_entries_level', sql`${table.levelPercent} is null or ${table.levelPercent} between 0 and 100`),
  check('run_entries_temperature', sql`${table.temperatureK} is null or ${table.temperatureK} > 0`),
  check('run_entries_transfer', sql`${table.kind} <> 'transfer' or (num_nonnulls(${table.fromAccountId}, ${table.startedAt}, ${table.drawnLitres}, ${table.beforeLitres}, ${table.liquidLitres}) = 5 and ${table.drawnLitres} > 0 and ${table.beforeLitres} >= 0 and ${table.liquidLitres} between ${table.beforeLitres} and ${table.beforeLitres} + ${table.drawnLitres} and ${table.startedAt} <= ${table.at})`),
])
