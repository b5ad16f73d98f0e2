import { and, desc, eq } from 'drizzle-orm'
import type { Actor } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import type { Payments } from '#server/adapters/payments/client'
import type { Database } from '#server/db/client'
import { payments } from '#server/db/schema'
import { readFacility } from '#server/services/facility/queries'
import { lockRun } from '#server/services/runs/lock-run'
import { openCheckout } from './open-checkout'

/**
 * Begins (or goes on with) paying a deposit: one live checkout a run, so that pressing twice gives the same page.
 *
 * @param db database
 * @param provider the payment provider
 * @param input the run, who pays, and the instant
 * @returns address of the hosted page
 * @throws DomainError when nothing is to be paid or the time to pay is over
 */
export async function startDeposit(db: Database, provider: Payments, input: { runId: string, actor: Actor, now: Date }): Promise<{ checkoutUrl: string }> {
  const { runId, actor, now } = input
  const payment = await db.transaction(async (tx) => {
    const run = await lockRun(tx, runId, actor, 'run:pay')
    if (run.state === 'confirmed') throw new DomainError('conflict', 'The deposit of this run is paid already.')
    if (run.state !== 'approved') throw new DomainError('conflict', 'A deposit can be paid only while a run waits for it.')
    if (run.payBy && run.payBy <= now) throw new DomainError('conflict', 'The time to pay this deposit is over. Ask for days again.')
    if (run.quote.depositMinor <= 0) throw new DomainError('conflict', 'No deposit is due for this run.')
    const [last] = await tx.select().from(payments).where(and(eq(payments.runId, runId), eq(payments.kind, 'deposit'))).orderBy(desc(payments.attempt)).limit(1)
    if (last?.state === 'open') return last
    const attempt = (last?.attempt ?? 0) + 1
    // Stored before anything is sent: a process that dies in between goes on with the same key.
    const { currency } = await readFacility(tx)
    const [row] = await tx.insert(payments).values({
      runId, kind: 'deposit', attempt, state: 'open', amountMinor: run.quote.depositMinor, currency, idempotencyKey: `deposit:${runId}:${attempt}`,
    }).returning()
    return row!
  })
  return { checkoutUrl: await openCheckout(db, provider, { payment, now }) }
}
