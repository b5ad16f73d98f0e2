import { sql } from 'drizzle-orm'
import { type AnyPgColumn, bigint, boolean, check, date, doublePrecision, index, integer, jsonb, pgTable, primaryKey, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { createdAt, id, instant } from '../columns'
import { groups, people } from './people'
import { runs } from './runs'
import type { GroupClass } from '#shared/pricing/rate-card'

/** A rate card; once issued it never changes (trigger). */
export const rateCards = pgTable('rate_cards', {
  id: id(),
  name: text('name').notNull(),
  validFrom: date('valid_from', { mode: 'string' }).notNull(),
  currency: text('currency').notNull(),
  depositPercent: integer('deposit_percent').notNull(),
  issuedAt: instant('issued_at'),
  createdAt: createdAt(),
}, table => [check('rate_cards_deposit', sql`${table.depositPercent} between 0 and 100`)])

/** Prices of a card for one group class, in minor units. */
export const rateCardPrices = pgTable('rate_card_prices', {
  rateCardId: uuid('rate_card_id').notNull().references(() => rateCards.id),
  groupClass: text('group_class').$type<GroupClass>().notNull(),
  perCooldownMinor: bigint('per_cooldown_minor', { mode: 'number' }).notNull(),
  perDayMinor: bigint('per_day_minor', { mode: 'number' }).notNull(),
  perLitreMinor: bigint('per_litre_minor', { mode: 'number' }).notNull(),
  recoveryCreditPerLitreMinor: bigint('recovery_credit_per_litre_minor', { mode: 'number' }).notNull(),
  perOperatorHourMinor: bigint('per_operator_hour_minor', { mode: 'number' }).notNull(),
  perMountingMinor: bigint('per_mounting_minor', { mode: 'number' }).notNull(),
  minimumMinor: bigint('minimum_minor', { mode: 'number' }).notNull(),
  vatBasisPoints: integer('vat_basis_points').notNull(),
}, table => [
  primaryKey({ columns: [table.rateCardId, table.groupClass] }),
  check('rate_card_prices_class', sql`${table.groupClass} in ('internal', 'academic', 'industry')`),
  check('rate_card_prices_not_negative', sql`least(${table.perCooldownMinor}, ${table.perDayMinor}, ${table.perLitreMinor}, ${table.recoveryCreditPerLitreMinor}, ${table.perOperatorHourMinor}, ${table.perMountingMinor}, ${table.minimumMinor}) >= 0 and ${table.vatBasisPoints} between 0 and 10000`),
])

export const PAYMENT_KINDS = ['deposit', 'balance', 'refund'] as const
export const PAYMENT_STATES = ['open', 'succeeded', 'requires-action', 'failed', 'expired'] as const
export type PaymentKind = (typeof PAYMENT_KINDS)[number]
export type PaymentState = (typeof PAYMENT_STATES)[number]

/** One attempt to move money at the provider. The key is stored before anything is sent. */
export const payments = pgTable('payments', {
  id: id(),
  runId: uuid('run_id').notNull().references(() => runs.id),
  kind: text('kind').$type<PaymentKind>().notNull(),
  attempt: integer('attempt').notNull(),
  state: text('state').$type<PaymentState>().notNull(),
  amountMinor: bigint('amount_minor', { mode: 'number' }).notNull(),
  currency: text('currency').notNull(),
  idempotencyKey: text('idempotency_key').notNull().unique(),
  sessionId: text('session_id').unique(),
  checkoutUrl: text('checkout_url'),
  intentId: text('intent_id'),
  refundId: text('refund_id').unique(),
  /** Where the payer confirms when the bank asks for it. */
  actionUrl: text('action_url'),
  failure: text('failure'),
  createdAt: createdAt(),
  settledAt: instant('settled_at'),
}, table => [
  uniqueIndex('payments_attempt').on(table.runId, table.kind, table.attempt),
  uniqueIndex('payments_one_open').on(table.runId, table.kind).where(sql`state in ('open', 'requires-action')`),
  check('payments_kind', sql`${table.kind} in ('deposit', 'balance', 'refund')`),
  check('payments_state', sql`${table.state} in ('open', 'succeeded', 'requires-action', 'failed', 'expired')`),
  check('payments_amount', sql`${table.amountMinor} > 0`),
])

/** An event of the payment provider, stored once by its id. It is a hint: the object is read afresh by a job. */
export const paymentEvents = pgTable('payment_events', {
  id: text('id').primaryKey(),
  type: text('type').notNull(),
  objectId: text('object_id').notNull(),
  payload: jsonb('payload').$type<Record<string, unknown>>().notNull(),
  receivedAt: instant('received_at').notNull().defaultNow(),
  processedAt: instant('processed_at'),
})

/** Last number given, a row for each year and series; the insert trigger of invoices is its only writer. */
export const invoiceCounters = pgTable('invoice_counters', {
  series: text('series').notNull(),
  year: integer('year').notNull(),
  lastSequence: integer('last_sequence').notNull(),
}, table => [primaryKey({ columns: [table.series, table.year] })])

/** A party of an invoice as printed; later edits of the group do not reach it. */
export interface InvoiceParty { name: string, addressLines: string[], email: string, vatId: string | null }

/** An issued invoice or credit note: numbered without gaps by the database, never edited or deleted (triggers). */
export const invoices = pgTable('invoices', {
  id: id(),
  kind: text('kind').$type<'invoice' | 'credit-note'>().notNull(),
  series: text('series').notNull().default('A'),
  year: integer('year').notNull(),
  sequence: integer('sequence').notNull(),
  number: text('number').notNull().unique(),
  runId: uuid('run_id').notNull().references(() => runs.id),
  groupId: uuid('group_id').notNull().references(() => groups.id),
  correctsInvoiceId: uuid('corrects_invoice_id').references((): AnyPgColumn => invoices.id),
  issuedAt: instant('issued_at').notNull(),
  issuedOn: date('issued_on', { mode: 'string' }).notNull(),
  dueOn: date('due_on', { mode: 'string' }),
  suppliedOn: date('supplied_on', { mode: 'string' }).notNull(),
  seller: jsonb('seller').$type<InvoiceParty>().notNull(),
  buyer: jsonb('buyer').$type<InvoiceParty>().notNull(),
  reference: text('reference').notNull().default(''),
  currency: text('currency').notNull(),
  vatBasisPoints: integer('vat_basis_points').notNull(),
  reverseCharge: boolean('reverse_charge').notNull(),
  netMinor: bigint('net_minor', { mode: 'number' }).notNull(),
  vatMinor: bigint('vat_minor', { mode: 'number' }).notNull(),
  totalMinor: bigint('total_minor', { mode: 'number' }).notNull(),
  prepaidMinor: bigint('prepaid_minor', { mode: 'number' }).notNull(),
  /** Positive: still to pay; negative: to be refunded. */
  dueMinor: bigint('due_minor', { mode: 'number' }).notNull(),
  paymentText: text('payment_text').notNull(),
}, table => [
  uniqueIndex('invoices_number').on(table.series, table.year, table.sequence),
  uniqueIndex('invoices_one_for_run').on(table.runId).where(sql`kind = 'invoice'`),
  index('invoices_group').on(table.groupId),
  check('invoices_kind', sql`${table.kind} in ('invoice', 'credit-note')`),
  check('invoices_amounts', sql`${table.netMinor} >= 0 and ${table.vatMinor} >= 0 and ${table.prepaidMinor} >= 0 and ${table.totalMinor} = ${table.netMinor} + ${table.vatMinor} and ${table.dueMinor} = ${table.totalMinor} - ${table.prepaidMinor}`),
])

/** Lines of an invoice: the estimate beside what was used. */
export const invoiceLines = pgTable('invoice_lines', {
  invoiceId: uuid('invoice_id').notNull().references(() => invoices.id),
  position: integer('position').notNull(),
  kind: text('kind').notNull(),
  label: text('label').notNull(),
  unit: text('unit').notNull(),
  estimatedQuantity: doublePrecision('estimated_quantity'),
  quantity: doublePrecision('quantity').notNull(),
  unitPriceMinor: bigint('unit_price_minor', { mode: 'number' }).notNull(),
  estimatedNetMinor: bigint('estimated_net_minor', { mode: 'number' }),
  netMinor: bigint('net_minor', { mode: 'number' }).notNull(),
}, table => [primaryKey({ columns: [table.invoiceId, table.position] })])

/** The stored PDF of an invoice: its file and hash, written once. */
export const invoiceDocuments = pgTable('invoice_documents', {
  invoiceId: uuid('invoice_id').primaryKey().references(() => invoices.id),
  fileKey: text('file_key').notNull(),
  sha256: text('sha256').notNull(),
  bytes: integer('bytes').notNull(),
  renderedAt: instant('rendered_at').notNull().defaultNow(),
  renderedBy: uuid('rendered_by').references(() => people.id),
})
