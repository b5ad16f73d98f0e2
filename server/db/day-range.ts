import { sql, type SQL } from 'drizzle-orm'

/** Days of the facility: the first and the day after the last, or null for two weeks from this week's Monday. */
export interface DayRange { from: string | null, to: string | null, now: Date }

/** Days shown when nobody says how many. */
const USUAL_DAYS = 14

/**
 * SQL of one row with the facility and the instants at which its days begin: `name`, `time_zone`, `reserve_litres`,
 * `first_day`, `last_day`, `from_at`, `to_at`. Made inside the database so that a request needs no second round trip for the zone.
 */
export function facilityDayRange({ from, to, now }: DayRange): SQL {
  return sql`
    select facility.name, facility.time_zone, facility.reserve_litres, days.first_day, days.last_day,
      days.first_day::timestamp at time zone facility.time_zone as from_at, days.last_day::timestamp at time zone facility.time_zone as to_at
    from facilities facility
    cross join lateral (select coalesce(${from}::date, date_trunc('week', ${now.toISOString()}::timestamptz at time zone facility.time_zone)::date) as first_day) beginning
    cross join lateral (select beginning.first_day, coalesce(${to}::date, beginning.first_day + ${USUAL_DAYS}::int) as last_day) days
    limit 1`
}

/** Names a range for readers who share it: its days and the minute, since what is shown of a range also depends on the time. */
export function dayRangeKey({ from, to, now }: DayRange): string {
  return `${from}/${to}/${Math.floor(now.getTime() / 60_000)}`
}
