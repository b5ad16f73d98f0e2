import { sql } from 'drizzle-orm'
import { bigint, boolean, check, doublePrecision, index, integer, jsonb, pgTable, text, uuid } from 'drizzle-orm/pg-core'
import { createdAt, id, instant, span } from '../columns'
import { people } from './people'
import type { ColdMassPart, TimedPhaseId } from '#shared/planning/types'

export const CRYOSTAT_KINDS = ['bath-he4', 'he3-insert', 'dilution', 'closed-cycle'] as const
export type CryostatKind = (typeof CRYOSTAT_KINDS)[number]

/** One step of the refund ladder: from so many days before the start, this percentage comes back. */
export interface RefundStep { fromDaysBefore: number, refundPercent: number }

/** The facility itself; one row. */
export const facilities = pgTable('facilities', {
  id: id(),
  name: text('name').notNull(),
  timeZone: text('time_zone').notNull(),
  currency: text('currency').notNull(),
  addressLines: jsonb('address_lines').$type<string[]>().notNull(),
  email: text('email').notNull(),
  vatId: text('vat_id').notNull(),
  bankAccount: text('bank_account').notNull(),
  reserveLitres: doublePrecision('reserve_litres').notNull(),
  payByHours: integer('pay_by_hours').notNull(),
  quoteLockDays: integer('quote_lock_days').notNull(),
  paymentTermDays: integer('payment_term_days').notNull(),
  refundLadder: jsonb('refund_ladder').$type<RefundStep[]>().notNull(),
  /** Thresholds of result checks that the manager tuned; only those that differ from the table in shared/. */
  checkThresholds: jsonb('check_thresholds').$type<Record<string, number>>().notNull().default({}),
})

/** A cryostat with the facts that planning needs. */
export const cryostats = pgTable('cryostats', {
  id: id(),
  slug: text('slug').notNull().unique(),
  name: text('name').notNull(),
  kind: text('kind').$type<CryostatKind>().notNull(),
  position: integer('position').notNull(),
  baseTemperatureK: doublePrecision('base_temperature_k').notNull(),
  maximumFieldT: doublePrecision('maximum_field_t').notNull().default(0),
  usesLiquid: boolean('uses_liquid').notNull(),
  nitrogenPrecool: boolean('nitrogen_precool').notNull(),
  /** Level calibration of the helium vessel, rising. */
  vesselCalibration: jsonb('vessel_calibration').$type<{ percent: number, litres: number }[]>().notNull(),
  /** What is cooled: kilograms a material. */
  coldMass: jsonb('cold_mass').$type<ColdMassPart[]>().notNull(),
  staticBoilOffLitresPerHour: doublePrecision('static_boil_off_litres_per_hour').notNull(),
  transferLossFraction: doublePrecision('transfer_loss_fraction').notNull(),
  recoveryFraction: doublePrecision('recovery_fraction').notNull(),
  /** Stated prior of the share of the gas's enthalpy that cools, learned from finished runs. */
  gasUsePrior: jsonb('gas_use_prior').$type<{ mean: number, standardDeviation: number }>().notNull(),
  /** Stated prior of phase hours. */
  phaseHoursPrior: jsonb('phase_hours_prior').$type<Partial<Record<TimedPhaseId, { mean: number, standardDeviation: number }>>>().notNull(),
  /** Thermal conductance of the calorimeter link at 4 K, for the time a point takes. */
  linkConductanceWPerK: doublePrecision('link_conductance_w_per_k').notNull(),
  roomVolumeM3: doublePrecision('room_volume_m3').notNull(),
  retiredAt: instant('retired_at'),
}, table => [
  check('cryostats_kind', sql`${table.kind} in ('bath-he4', 'he3-insert', 'dilution', 'closed-cycle')`),
  check('cryostats_fractions', sql`${table.transferLossFraction} between 0 and 1 and ${table.recoveryFraction} between 0 and 1`),
])

/** Days on which a cryostat takes no runs. */
export const closures = pgTable('closures', {
  id: id(),
  cryostatId: uuid('cryostat_id').notNull().references(() => cryostats.id),
  during: span('during').notNull(),
  reason: text('reason').notNull(),
  createdBy: uuid('created_by').notNull().references(() => people.id),
  createdAt: createdAt(),
}, table => [
  index('closures_cryostat').on(table.cryostatId),
  check('closures_bounded', sql`not isempty(${table.during}) and not lower_inf(${table.during}) and not upper_inf(${table.during})`),
])

/**
 * Who holds a cryostat when: one row for each holding run and each closure, written by triggers alone.
 * Its exclusion constraint (hand-written migration) is what makes a double booking impossible.
 */
export const cryostatHolds = pgTable('cryostat_holds', {
  id: bigint('id', { mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
  cryostatId: uuid('cryostat_id').notNull().references(() => cryostats.id),
  during: span('during').notNull(),
  runId: uuid('run_id').unique(),
  closureId: uuid('closure_id').unique(),
})
