import { join } from 'node:path'
import { PGlite } from '@electric-sql/pglite'
import { btree_gist } from '@electric-sql/pglite/contrib/btree_gist'
import { drizzle as drizzlePg } from 'drizzle-orm/node-postgres'
import type { PgDatabase, PgQueryResultHKT } from 'drizzle-orm/pg-core'
import { drizzle as drizzlePglite } from 'drizzle-orm/pglite'
import pg from 'pg'
import { lockFolder } from './folder-lock'
import * as schema from './schema'

/** Both drivers give rows under `rows`; the rest of their results is not used. */
interface RowsResultHKT extends PgQueryResultHKT {
  type: { rows: Record<string, unknown>[] }
}

/** The database, or a transaction on it: what every service takes as its first argument. */
export type Database = PgDatabase<RowsResultHKT, typeof schema>

/** An open database with what only its owner needs. */
export interface OpenDatabase {
  db: Database
  /** `pglite` (embedded, one process) or `postgres` (a server, any number of processes). */
  driver: 'pglite' | 'postgres'
  /** Runs SQL as text, as the job queue's library writes it; without values the text may hold several statements. */
  query(text: string, values?: unknown[]): Promise<{ rows: Record<string, unknown>[] }>
  /** Calls back for every notification on a channel; returns a function that stops listening. */
  listen(channel: string, onPayload: (payload: string) => void): Promise<() => Promise<void>>
  close(): Promise<void>
}

/** Where the data is: a PostgreSQL server, a PGlite folder, or (for tests) memory, perhaps from a dump. */
export type DatabaseLocation = { url: string } | { folder: string } | { memory: true, dump?: Blob }

/**
 * Opens the database.
 *
 * @param location a PostgreSQL URL, a data folder for PGlite, or memory
 * @throws FolderTakenError when another process owns the folder
 */
export async function openDatabase(location: DatabaseLocation): Promise<OpenDatabase> {
  return 'url' in location ? openPostgres(location.url) : openPglite(location)
}

async function openPostgres(url: string): Promise<OpenDatabase> {
  const pool = new pg.Pool({ connectionString: url, max: 10 })
  // An idle connection that breaks is replaced by the pool; without a listener it would end the process.
  pool.on('error', () => undefined)
  await pool.query('select 1')
  return {
    db: drizzlePg(pool, { schema }) as unknown as Database,
    driver: 'postgres',
    query: async (text, values) => {
      const result = await pool.query<Record<string, unknown>>(text, values)
      return { rows: result.rows ?? [] }
    },
    listen: async (channel, onPayload) => {
      const client = await pool.connect()
      client.on('notification', message => onPayload(message.payload ?? ''))
      await client.query(`listen ${pg.escapeIdentifier(channel)}`)
      return async () => client.release(true)
    },
    close: () => pool.end(),
  }
}

async function openPglite(location: Exclude<DatabaseLocation, { url: string }>): Promise<OpenDatabase> {
  const unlock = 'folder' in location ? lockFolder(location.folder) : () => undefined
  try {
    const lite = await PGlite.create({
      dataDir: 'folder' in location ? join(location.folder, 'database') : undefined,
      loadDataDir: 'memory' in location ? location.dump : undefined,
      extensions: { btree_gist },
    })
    return {
      db: drizzlePglite(lite, { schema }) as unknown as Database,
      driver: 'pglite',
      query: async (text, values) => values?.length
        ? lite.query<Record<string, unknown>>(text, values)
        : { rows: (await lite.exec(text)).at(-1)?.rows as Record<string, unknown>[] ?? [] },
      listen: async (channel, onPayload) => lite.listen(channel, onPayload),
      close: async () => {
        await lite.close()
        unlock()
      },
    }
  }
  catch (error) {
    unlock()
    throw error
  }
}
