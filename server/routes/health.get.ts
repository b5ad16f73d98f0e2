import { sql } from 'drizzle-orm'
import { definePublicApi } from '#server/utils/define-api'

/** Answers once the database is open and migrated. */
export default definePublicApi({ why: 'says only that the server is up' }, async ({ db }) => {
  await db.execute(sql`select 1`)
  return { status: 'up' }
})
