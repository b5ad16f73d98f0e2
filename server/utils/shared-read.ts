import { sql } from 'drizzle-orm'
import type { Database } from '#server/db/client'

/** What was read, and which transactions it saw. */
interface Seen<Output> { snapshot: string, output: Output }

/** A read that is under way, one that has been asked for and not begun, and what the last one saw. */
interface Flight<Output> { running: Promise<unknown> | undefined, waiting: Promise<Output> | undefined, seen: Seen<Output> | undefined }

/** Keys of which the last result is kept; old ones go first. */
const MOST_KEYS = 64

const nextTurn = () => new Promise<void>(resolve => setImmediate(resolve))

/** Which transactions a reader sees now: while this text stays the same, so does every row. */
async function snapshotOf(db: Database): Promise<string> {
  const { rows } = await db.execute(sql`select pg_current_snapshot()::text as snapshot`)
  return String(rows[0]?.snapshot)
}

/**
 * Spares the database what it has just answered, without ever showing anything old: the last result is used again only while
 * the database's own snapshot is the same, so that nothing can have been committed since; and people who ask for the same
 * thing at the same moment share one query, never one that began before they asked.
 *
 * The query begins after the requests that have already arrived were taken in: PGlite answers without giving way to them, so
 * without that turn each of fifty requests would run a query of its own.
 *
 * @param keyOf names what is asked for; equal keys give equal results from equal rows, so a result that depends on the clock
 *   carries as much of the time in its key as it may be behind
 * @param load reads it; its result is shared, so callers must not change it
 * @returns a function that reads, alone or together with others
 */
export function sharedRead<Input, Output>(keyOf: (input: Input) => string, load: (db: Database, input: Input) => Promise<Output>) {
  const flightsOf = new WeakMap<Database, Map<string, Flight<Output>>>()

  return (db: Database, input: Input): Promise<Output> => {
    const flights = flightsOf.get(db) ?? new Map<string, Flight<Output>>()
    flightsOf.set(db, flights)
    const key = keyOf(input)
    const flight = flights.get(key) ?? { running: undefined, waiting: undefined, seen: undefined }
    flights.set(key, flight)
    for (const oldest of flights.keys()) {
      if (flights.size <= MOST_KEYS) break
      flights.delete(oldest)
    }

    const read = async (): Promise<Output> => {
      const snapshot = await snapshotOf(db)
      if (flight.seen?.snapshot === snapshot) return flight.seen.output
      const output = await load(db, input)
      // The snapshot was taken before the rows were read: newer rows only make the next reader look again.
      flight.seen = { snapshot, output }
      return output
    }

    const begin = (): Promise<Output> => {
      flight.waiting = undefined
      const result = read()
      flight.running = result
      const end = () => {
        if (flight.running === result) flight.running = undefined
      }
      result.then(end, end)
      return result
    }

    flight.waiting ??= Promise.resolve(flight.running).then(nextTurn, nextTurn).then(begin)
    return flight.waiting
  }
}
