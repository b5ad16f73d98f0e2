import { createHash } from 'node:crypto'
import { sql } from 'drizzle-orm'
import type { Database } from './client'

/** The journal that drizzle-kit writes beside its SQL files. */
interface Journal { entries: { idx: number, when: number, tag: string, breakpoints: boolean }[] }

/** Reads one file of the migrations folder, from disk or from the built server's assets. */
export type ReadMigrationFile = (path: string) => Promise<string>

// One number for all Holdtime processes; any constant will do.
const MIGRATION_LOCK = 4_210_007

/**
 * Applies the migrations that are not applied yet, one transaction each, under an advisory lock so that
 * several processes starting together apply each once. (Drizzle's own migrator wants a folder on disk, which
 * the built server has not; the table it keeps is the same.)
 *
 * @param db open database
 * @param read reads a file of the migrations folder by its relative path
 * @returns how many were applied
 */
export async function applyMigrations(db: Database, read: ReadMigrationFile): Promise<number> {
  const journal = JSON.parse(await read('meta/_journal.json')) as Journal
  const files = await Promise.all(journal.entries.map(async entry => ({ entry, text: await read(`${entry.tag}.sql`) })))

  return db.transaction(async (tx) => {
    await tx.execute(sql`select pg_advisory_xact_lock(${MIGRATION_LOCK})`)
    await tx.execute(sql`create schema if not exists drizzle`)
    await tx.execute(sql`create table if not exists drizzle.__drizzle_migrations (id serial primary key, hash text not null, created_at bigint)`)
    const applied = await tx.execute(sql`select hash from drizzle.__drizzle_migrations`)
    const known = new Set(applied.rows.map(row => row.hash))
    let count = 0
    for (const { entry, text } of files) {
      const hash = createHash('sha256').update(text).digest('hex')
      if (known.has(hash)) continue
      for (const statement of text.split('--> statement-breakpoint')) await tx.execute(sql.raw(statement))
      await tx.execute(sql`insert into drizzle.__drizzle_migrations (hash, created_at) values (${hash}, ${entry.when})`)
      count += 1
    }
    return count
  })
}
