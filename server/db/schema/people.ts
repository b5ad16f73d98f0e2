import { sql } from 'drizzle-orm'
import { bigint, boolean, check, index, integer, jsonb, pgTable, primaryKey, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { createdAt, id, instant } from '../columns'
import type { GroupClass } from '#shared/pricing/rate-card'

/** A person who signs in. Invitations, resets and second factors will refer to this row. */
export const people = pgTable('people', {
  id: id(),
  email: text('email').notNull(),
  name: text('name').notNull(),
  passwordHash: text('password_hash').notNull(),
  isManager: boolean('is_manager').notNull().default(false),
  isOperator: boolean('is_operator').notNull().default(false),
  timeZone: text('time_zone'),
  disabledAt: instant('disabled_at'),
  /** Consecutive failures and the instant before which a further try is refused. */
  failedSignIns: integer('failed_sign_ins').notNull().default(0),
  retryAfter: instant('retry_after'),
  createdAt: createdAt(),
}, table => [uniqueIndex('people_email').on(sql`lower(${table.email})`)])

/** A research group; its class decides the rate and whether a deposit is due. */
export const groups = pgTable('groups', {
  id: id(),
  name: text('name').notNull().unique(),
  class: text('class').$type<GroupClass>().notNull(),
  institution: text('institution').notNull(),
  addressLines: jsonb('address_lines').$type<string[]>().notNull(),
  invoiceEmail: text('invoice_email').notNull(),
  vatId: text('vat_id'),
  reverseCharge: boolean('reverse_charge').notNull().default(false),
  /** Cost codes an internal group may book on. */
  costCodes: jsonb('cost_codes').$type<string[]>().notNull().default([]),
  /** Cap of a calendar year in minor units; null is no cap. */
  capMinor: bigint('cap_minor', { mode: 'number' }),
  /** The payment provider's customer, made at the first payment. */
  paymentCustomerId: text('payment_customer_id'),
  createdAt: createdAt(),
}, table => [
  check('groups_class', sql`${table.class} in ('internal', 'academic', 'industry')`),
  check('groups_cap', sql`${table.capMinor} is null or ${table.capMinor} >= 0`),
])

/** Who belongs to a group, and as what. */
export const groupMemberships = pgTable('group_memberships', {
  groupId: uuid('group_id').notNull().references(() => groups.id),
  personId: uuid('person_id').notNull().references(() => people.id),
  role: text('role').$type<'member' | 'pi'>().notNull(),
}, table => [
  primaryKey({ columns: [table.groupId, table.personId] }),
  index('group_memberships_person').on(table.personId),
  check('group_memberships_role', sql`${table.role} in ('member', 'pi')`),
])

/** A signed-in browser. The cookie's token carries the id; this row can be revoked at once. */
export const sessions = pgTable('sessions', {
  id: id(),
  secretHash: text('secret_hash').notNull().unique(),
  personId: uuid('person_id').notNull().references(() => people.id),
  userAgent: text('user_agent').notNull(),
  createdAt: createdAt(),
  lastSeenAt: instant('last_seen_at').notNull().defaultNow(),
  expiresAt: instant('expires_at').notNull(),
  revokedAt: instant('revoked_at'),
}, table => [index('sessions_person').on(table.personId)])

/** What was done by whom; append-only (trigger). */
export const auditEvents = pgTable('audit_events', {
  id: bigint('id', { mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
  at: instant('at').notNull().defaultNow(),
  actorId: uuid('actor_id'),
  action: text('action').notNull(),
  objectType: text('object_type').notNull(),
  objectId: text('object_id'),
  requestId: text('request_id'),
  detail: jsonb('detail').$type<Record<string, unknown>>().notNull().default({}),
}, table => [index('audit_events_object').on(table.objectType, table.objectId)])
