import type { Database } from '#server/db/client'

const nextTurn = () => new Promise<void>(resolve => setImmediate(resolve))

/** A read that is under way, and one that has been asked for and not begun. */
interface Flight<Output> { running: Promise<unknown> | undefined, waiting: Promise<Output> | undefined }

/**
 * Lets people who ask for the same thing at the same moment share one query. A query that has begun is never shared with
 * somebody who asks later, so everyone still sees what was committed before they asked.
 *
 * The query begins after the requests that have already arrived were taken in: PGlite answers without giving way to them, so
 * without that turn each of fifty requests would run a query of its own.
 *
 * @param keyOf names what is asked for; equal keys give equal results
 * @param load reads it; its result is shared, so callers must not change it
 * @returns a function that reads, alone or together with others
 */
export function sharedRead<Input, Output>(keyOf: (input: Input) => string, load: (db: Database, input: Input) => Promise<Output>) {
  const flightsOf = new WeakMap<Database, Map<string, Flight<Output>>>()

  return (db: Database, input: Input): Promise<Output> => {
    const flights = flightsOf.get(db) ?? new Map<string, Flight<Output>>()
    flightsOf.set(db, flights)
    const key = keyOf(input)
    const flight = flights.get(key) ?? { running: undefined, waiting: undefined }
    flights.set(key, flight)

    const begin = (): Promise<Output> => {
      flight.waiting = undefined
      const result = load(db, input)
      flight.running = result
      const end = () => {
        flight.running = undefined
        if (!flight.waiting) flights.delete(key)
      }
      result.then(end, end)
      return result
    }

    flight.waiting ??= Promise.resolve(flight.running).then(nextTurn, nextTurn).then(begin)
    return flight.waiting
  }
}
