import { customType, timestamp, uuid } from 'drizzle-orm/pg-core'
import { v7 as uuidv7 } from 'uuid'

/** Primary key: a UUIDv7, so that rows sort by when they were made. */
export const id = () => uuid('id').primaryKey().$defaultFn(() => uuidv7())

/** An instant, stored in UTC, handled as a Date. */
export const instant = (name: string) => timestamp(name, { withTimezone: true, mode: 'date' })

/** When the row was written. */
export const createdAt = () => instant('created_at').notNull().defaultNow()

/** A half-open span of time, `[startsAt, endsAt)`. */
export interface Span {
  startsAt: Date
  endsAt: Date
}

/** `tstzrange`, always half-open; empty and unbounded spans are refused by check constraints on the tables. */
export const span = customType<{ data: Span, driverData: string }>({
  dataType: () => 'tstzrange',
  toDriver: value => `[${value.startsAt.toISOString()},${value.endsAt.toISOString()})`,
  fromDriver: (value) => {
    const match = /^\["?([^",]+)"?,"?([^",)]+)"?\)$/.exec(value)
    if (!match?.[1] || !match[2]) throw new Error(`not a bounded tstzrange: ${value}`)
    return { startsAt: new Date(withZoneMinutes(match[1])), endsAt: new Date(withZoneMinutes(match[2])) }
  },
})

/** PostgreSQL writes `+00`; ISO 8601 as read by Date wants `+00:00`. */
function withZoneMinutes(text: string): string {
  return text.replace(' ', 'T').replace(/([+-]\d{2})$/, '$1:00')
}
