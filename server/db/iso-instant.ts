import { sql, type SQL } from 'drizzle-orm'

/** SQL that writes an instant as ISO 8601 in UTC, for JSON built inside the database. */
export function isoInstant(instant: SQL): SQL<string> {
  return sql<string>`to_char(${instant} at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"')`
}
