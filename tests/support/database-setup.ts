import type { TestProject } from 'vitest/node'
import { startPostgres } from './postgres'

declare module 'vitest' {
  interface ProvidedContext {
    /** URL of the test server's maintenance database. */
    postgresAdminUrl: string
  }
}

/** Starts one PostgreSQL server for all files of the database project. */
export default async function setup(project: TestProject) {
  const postgres = await startPostgres()
  project.provide('postgresAdminUrl', postgres.adminUrl)
  return () => postgres.stop()
}
