import { and, eq, lt, sql } from 'drizzle-orm'
import { runs } from '#server/db/schema'
import { enqueueJob } from '#server/jobs/queue'
import { sweepCheckouts } from '#server/services/payments/sweep-checkouts'
import { beforeDatabaseCloses, databaseReady } from '#server/utils/database'
import { log } from '#server/utils/log'
import { usePayments } from '#server/utils/services'

const SWEEP_EVERY_MS = 60_000
/** A finished run without an invoice for this long has lost its job, and is queued again. */
const OVERLOOKED_AFTER_MS = 120_000

/**
 * Charges external users after a run is finished. The work itself is a job (charge-finished-run) queued in the
 * transaction that finishes the run; this plugin looks after what was overlooked: events that never came, and finished
 * runs whose job was lost.
 */
export default defineNitroPlugin(() => {
  if (import.meta.prerender) return
  let sweeping: Promise<void> = Promise.resolve()
  const timer = setInterval(() => {
    sweeping = sweeping.then(sweep).catch((error: Error) => log.warn({ err: error }, 'sweep of payments'))
  }, SWEEP_EVERY_MS)
  beforeDatabaseCloses(async () => {
    clearInterval(timer)
    await sweeping
  })
})

async function sweep() {
  const { db } = await databaseReady()
  await sweepCheckouts(db, usePayments(), new Date())
  const overlooked = await db.select({ id: runs.id }).from(runs).where(and(
    eq(runs.state, 'finished'), lt(runs.finishedAt, new Date(Date.now() - OVERLOOKED_AFTER_MS)), sql`not exists (select 1 from invoices where invoices.run_id = ${runs.id})`,
  ))
  for (const { id } of overlooked) await enqueueJob(db, 'charge-finished-run', { runId: id })
}
