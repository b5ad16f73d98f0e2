import { fileURLToPath } from 'node:url'
import vue from '@vitejs/plugin-vue'
import { defineConfig } from 'vitest/config'

const at = (path: string) => fileURLToPath(new URL(path, import.meta.url))
const alias = { '#shared': at('./shared'), '#server': at('./server'), '~': at('.') }

/** One kind of test a project; `npm test` runs them in this order. */
const project = (name: string, include: string[], more: object = {}) =>
  ({ plugins: [vue()], resolve: { alias }, test: { name, include, environment: 'node' as const, ...more } })

export default defineConfig({
  test: {
    projects: [
      project('unit', ['tests/unit/**/*.spec.ts']),
      project('property', ['tests/property/**/*.spec.ts'], { testTimeout: 60_000 }),
      project('reference', ['tests/reference/**/*.spec.ts'], { testTimeout: 120_000 }),
      project('database', ['tests/database/**/*.spec.ts'], { testTimeout: 60_000, hookTimeout: 120_000, globalSetup: ['tests/support/database-setup.ts'], fileParallelism: false }),
      project('fakes', ['tests/fakes/**/*.spec.ts'], { testTimeout: 30_000 }),
      project('components', ['tests/components/**/*.spec.ts'], { environment: 'happy-dom' }),
      // The two below talk to the production build, started once by the set-up.
      project('api', ['tests/api/**/*.spec.ts', 'tests/race/**/*.spec.ts'], { testTimeout: 60_000, hookTimeout: 180_000, globalSetup: ['tests/support/server-setup.ts'], fileParallelism: false }),
      project('e2e', ['tests/e2e/**/*.spec.ts'], { testTimeout: 180_000, hookTimeout: 180_000, globalSetup: ['tests/support/server-setup.ts'], fileParallelism: false }),
    ],
  },
})
