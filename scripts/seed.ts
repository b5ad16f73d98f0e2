// Seeds an invented facility into an empty database: `npm run seed`, also run by the demo and the tests.
import { readFile, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { eq } from 'drizzle-orm'
import { openFileStore } from '#server/adapters/storage/files'
import { openDatabase } from '#server/db/client'
import { applyMigrations } from '#server/db/migrate'
import { facilities, payments } from '#server/db/schema'
import { seedDemo } from '#server/db/seed'
import { addPastPayments, saveState } from './fakes/payments/state'
import { PaymentsStore } from './fakes/payments/store'

const dataFolder = process.env.HOLDTIME_DATA ?? '.data'
const start = performance.now()
const fromRoot = (path: string) => new URL(`../${path}`, import.meta.url)
const font = (name: string) => readFile(fromRoot(`assets/fonts/IBMPlexSans_${name}.ttf`))

const open = await openDatabase(process.env.DATABASE_URL ? { url: process.env.DATABASE_URL } : { folder: dataFolder })
try {
  await applyMigrations(open.db, path => readFile(fromRoot(`drizzle/${path}`), 'utf8'))
  const standing = await open.db.select({ id: facilities.id }).from(facilities)
  if (standing.length > 0) {
    process.stderr.write('This database holds a facility already; nothing was seeded. Start afresh with another folder or an empty database.\n')
    process.exitCode = 1
  }
  else {
    const { signIns, runCount } = await seedDemo(open.db, {
      seed: Number(process.env.HOLDTIME_SEED ?? 4),
      now: new Date(),
      files: openFileStore({ dataFolder }),
      fonts: { regular: await font('400Regular'), medium: await font('500Medium'), semiBold: await font('600SemiBold') },
    })
    const deposits = await open.db.select().from(payments).where(eq(payments.kind, 'deposit'))
    const store = new PaymentsStore()
    addPastPayments(store, deposits.flatMap(({ intentId, amountMinor, currency, runId }) => intentId ? [{ intentId, amountMinor, currency, runId }] : []))
    saveState(join(dataFolder, 'payments-fake.json'), store)
    await writeFile(join(dataFolder, 'demo-sign-ins.json'), JSON.stringify(signIns, null, 2))
    process.stdout.write(`  ${runCount} runs of two years in ${((performance.now() - start) / 1000).toFixed(1)} s\n`)
  }
}
finally {
  await open.close()
}
