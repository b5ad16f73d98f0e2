import { and, isNotNull, eq } from 'drizzle-orm'
import type { Payments } from '#server/adapters/payments/client'
import type { Database } from '#server/db/client'
import { payments } from '#server/db/schema'
import { settleCheckout } from './settle-checkout'

/**
 * Asks the provider about every open checkout, so that a run is confirmed also when no event ever comes.
 *
 * @param db database
 * @param provider the payment provider
 * @param now the instant
 */
export async function sweepCheckouts(db: Database, provider: Payments, now: Date): Promise<void> {
  const open = await db.select({ sessionId: payments.sessionId }).from(payments).where(and(eq(payments.state, 'open'), isNotNull(payments.sessionId)))
  for (const { sessionId } of open) if (sessionId) await settleCheckout(db, provider, { sessionId, now })
}
