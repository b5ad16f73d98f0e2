import { readFile } from 'node:fs/promises'
import { inject } from 'vitest'
import { type OpenDatabase, openDatabase } from '#server/db/client'
import { applyMigrations } from '#server/db/migrate'
import { createDatabase } from './postgres'

/** The two databases that the same code runs on. */
export const DRIVERS = ['pglite', 'postgres'] as const
export type Driver = (typeof DRIVERS)[number]

/** Reads a migration file of the project. */
export const readMigration = (path: string) => readFile(new URL(`../../drizzle/${path}`, import.meta.url), 'utf8')

/** A migrated, empty database of the caller's own, on either driver. */
export async function openTestDatabase(driver: Driver): Promise<OpenDatabase> {
  const open = await openDatabase(driver === 'postgres' ? { url: await createDatabase(inject('postgresAdminUrl')) } : { memory: true })
  await applyMigrations(open.db, readMigration)
  return open
}
