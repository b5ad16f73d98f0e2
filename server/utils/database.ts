import type { Database, OpenDatabase } from '#server/db/client'

let opened: OpenDatabase | undefined
let opening: Promise<OpenDatabase> | undefined
const beforeClosing: (() => Promise<void>)[] = []

/** Registers work that must end before the database closes: Nitro runs its close hooks in order of registration, the database's first. */
export function beforeDatabaseCloses(work: () => Promise<void>) {
  beforeClosing.push(work)
}

/** Ends what needs the database, the latest first. */
export async function endDatabaseUsers() {
  for (const work of beforeClosing.toReversed()) await work()
}

/** Called once by the database plugin, when it starts opening. */
export function setDatabaseOpening(promise: Promise<OpenDatabase>) {
  opening = promise
}

/** Called by the database plugin when the database is open and migrated, and when it closes. */
export function setOpenDatabase(database: OpenDatabase | undefined) {
  opened = database
}

/** Resolves when the database is open and migrated; requests and jobs wait here while the server starts. */
export async function databaseReady(): Promise<OpenDatabase> {
  if (opened) return opened
  if (!opening) throw new Error('the database plugin has not run')
  return opening
}

/**
 * The database for routes and jobs; services take it as their first argument.
 *
 * @throws Error before it is open
 */
export function useDatabase(): Database {
  if (!opened) throw new Error('the database is not open yet')
  return opened.db
}
