import { sql } from 'drizzle-orm'
import PgBoss from 'pg-boss'
import type { Database, OpenDatabase } from '#server/db/client'
import { log } from '#server/utils/log'

/** Every job of the product with what it is given. Payloads name rows by id; handlers read them afresh. */
export interface JobPayloads {
  'lapse-unpaid-run': { runId: string }
  'handle-payment-event': { eventId: string }
  'charge-finished-run': { runId: string }
  'refund-deposit': { runId: string }
  'render-invoice': { invoiceId: string }
  'send-mail': { to: string, subject: string, text: string, key: string, attachInvoiceId?: string }
}

export type JobName = keyof JobPayloads

/** A handler may run twice with the same payload, after a crash between its effect and its mark; it must not act twice. */
export type JobHandlers = { [Name in JobName]: (payload: JobPayloads[Name], open: OpenDatabase) => Promise<void> }

// Of the same job with the same payload only one waits at a time ("short" policy).
const RETRY = { retryLimit: 8, retryDelay: 2, retryBackoff: true, expireInSeconds: 60 }
const POLL_S = 1

/** The durable queue: jobs live in the database, in the transaction that caused them. */
export interface JobQueue { stop(): Promise<void> }

let boss: PgBoss | undefined

/**
 * Starts the queue and its workers. Jobs that were running when the process died are taken up again.
 *
 * @param open the database
 * @param handlers what each job does
 */
export async function startJobs(open: OpenDatabase, handlers: JobHandlers): Promise<JobQueue> {
  const started = new PgBoss({ db: { executeSql: (text: string, values?: unknown[]) => open.query(text, values) }, schema: 'jobs', maintenanceIntervalSeconds: 30 })
  started.on('error', error => log.error({ err: error }, 'job queue'))
  await started.start()
  // The embedded database has one process: a job still marked active was cut off when the last one died. On a server it
  // may be another process's, and comes back when its time is over.
  if (open.driver === 'pglite') await open.query('update jobs.job set state = \'retry\', start_after = now() where state = \'active\'')
  // Before the workers: a job taken up again may queue others at once.
  boss = started
  for (const name of Object.keys(handlers) as JobName[]) await startWorker(started, name, handlers, open)
  return {
    stop: async () => {
      boss = undefined
      await started.stop({ graceful: true, wait: true, timeout: 5000 })
    },
  }
}

async function startWorker<Name extends JobName>(queue: PgBoss, name: Name, handlers: JobHandlers, open: OpenDatabase) {
  await queue.createQueue(name, { name, policy: 'short', ...RETRY })
  await queue.work<JobPayloads[Name]>(name, { pollingIntervalSeconds: POLL_S, batchSize: 1 }, async ([job]) => {
    if (!job) return
    try {
      await handlers[name](job.data, open)
    }
    catch (error) {
      log.error({ err: error, job: name, id: job.id }, 'job failed; it will be tried again')
      throw error
    }
  })
}

/**
 * Queues a job inside the caller's transaction, so that it exists exactly when the change that caused it does.
 *
 * @param tx transaction (or database)
 * @param name which job
 * @param payload what it is given
 * @param options `startAfter` delays it
 * @throws Error before the queue is started
 */
export async function enqueueJob<Name extends JobName>(
  tx: Database, name: Name, payload: JobPayloads[Name], options: { startAfter?: Date } = {},
): Promise<void> {
  if (!boss) throw new Error('the job queue is not started')
  const sender = { executeSql: (text: string, values: unknown[]) => tx.execute(withParameters(text, values)) as unknown as Promise<{ rows: Record<string, unknown>[] }> }
  await boss.send(name, payload, { ...RETRY, startAfter: options.startAfter, singletonKey: 'key' in payload ? payload.key : JSON.stringify(payload), db: sender })
}

/** Turns `$1`-style SQL into drizzle's, so that the library's statement runs on the caller's transaction. */
function withParameters(text: string, values: unknown[]) {
  const pieces = text.split(/\$(\d+)/)
  return sql.join(pieces.map((piece, index) => index % 2 === 0 ? sql.raw(piece) : sql`${sql.param(values[Number(piece) - 1])}`))
}
