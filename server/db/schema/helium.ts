import { sql } from 'drizzle-orm'
import { bigint, check, doublePrecision, index, pgTable, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { createdAt, id, instant } from '../columns'
import { cryostats } from './facility'
import { people } from './people'
import { runEntries, runs } from './runs'

export const HELIUM_ACCOUNT_KINDS = ['supplier', 'dewar', 'cryostat', 'recovery', 'lost'] as const
export type HeliumAccountKind = (typeof HELIUM_ACCOUNT_KINDS)[number]

/** A place helium can be. Balances are sums of postings. */
export const heliumAccounts = pgTable('helium_accounts', {
  id: id(),
  kind: text('kind').$type<HeliumAccountKind>().notNull(),
  name: text('name').notNull().unique(),
  cryostatId: uuid('cryostat_id').references(() => cryostats.id).unique(),
  capacityLitres: doublePrecision('capacity_litres'),
}, table => [check('helium_accounts_kind', sql`${table.kind} in ('supplier', 'dewar', 'cryostat', 'recovery', 'lost')`)])

/** One balanced movement of helium; its postings add up to nothing (deferred trigger). */
export const heliumMovements = pgTable('helium_movements', {
  id: id(),
  at: instant('at').notNull(),
  reason: text('reason').notNull(),
  runId: uuid('run_id').references(() => runs.id),
  entryId: uuid('entry_id').references(() => runEntries.id),
  recordedBy: uuid('recorded_by').references(() => people.id),
  createdAt: createdAt(),
}, table => [index('helium_movements_run').on(table.runId), index('helium_movements_at').on(table.at)])

/** Mass in whole milligrams, so that sums are exact. */
export const heliumPostings = pgTable('helium_postings', {
  id: bigint('id', { mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
  movementId: uuid('movement_id').notNull().references(() => heliumMovements.id),
  accountId: uuid('account_id').notNull().references(() => heliumAccounts.id),
  amountMg: bigint('amount_mg', { mode: 'number' }).notNull(),
}, table => [
  uniqueIndex('helium_postings_once').on(table.movementId, table.accountId),
  index('helium_postings_account').on(table.accountId),
])

/** Helium that is ordered; `receivedAt` is set when it has come. */
export const heliumDeliveries = pgTable('helium_deliveries', {
  id: id(),
  dueAt: instant('due_at').notNull(),
  litres: doublePrecision('litres').notNull(),
  dewarAccountId: uuid('dewar_account_id').notNull().references(() => heliumAccounts.id),
  supplierReference: text('supplier_reference').notNull(),
  receivedAt: instant('received_at'),
  movementId: uuid('movement_id').references(() => heliumMovements.id),
}, table => [check('helium_deliveries_litres', sql`${table.litres} > 0`)])
