import type { Database } from '#server/db/client'

interface Flight<Output> { running: Promise<unknown>, next: Promise<Output> | undefined }

/**
 * Lets people who ask for the same thing at the same moment share one query. A query under way is never shared with somebody
 * who asked after it began, so everyone still sees what was committed before they asked; only the waiting ones join.
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

    const start = (): Promise<Output> => {
      const result = load(db, input)
      const flight: Flight<Output> = { running: result, next: undefined }
      flights.set(key, flight)
      const land = () => {
        if (flights.get(key) === flight && !flight.next) flights.delete(key)
      }
      result.then(land, land)
      return result
    }

    const flight = flights.get(key)
    if (!flight) return start()
    flight.next ??= flight.running.then(start, start)
    return flight.next
  }
}
