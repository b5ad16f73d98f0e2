import { defineConfig } from 'drizzle-kit'

/** Generates SQL only; migrations are applied by the application (server/db/migrate.ts), which knows PGlite's extensions. */
export default defineConfig({
  dialect: 'postgresql',
  schema: './server/db/schema/*.ts',
  out: './drizzle',
})
