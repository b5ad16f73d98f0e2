import { and, eq, isNotNull } from 'drizzle-orm'
import { payments } from '#server/db/schema'
import { chargeFinishedRun } from '#server/services/invoices/charge-run'
import { renderInvoice } from '#server/services/invoices/render-invoice'
import { sendQueuedMail } from '#server/services/mail/send-queued-mail'
import { refundDeposit } from '#server/services/payments/refund-deposit'
import { recordCheckout } from '#server/services/payments/settle-checkout'
import { handlePaymentEvent } from '#server/services/payments/take-event'
import { lapseRun } from '#server/services/runs/lapse-run'
import { useFileStore } from '#server/utils/files'
import { readPdfFonts } from '#server/utils/fonts'
import { useMail, usePayments } from '#server/utils/services'
import type { JobHandlers } from './queue'

/** What each job does; each may run twice and then changes nothing more. */
export const jobHandlers: JobHandlers = {
  'lapse-unpaid-run': async ({ runId }, { db }) => {
    // A payer may be on the hosted page this very moment: end it first, and let a payment that was quicker count.
    const open = await db.select({ sessionId: payments.sessionId }).from(payments).where(and(eq(payments.runId, runId), eq(payments.kind, 'deposit'), eq(payments.state, 'open'), isNotNull(payments.sessionId)))
    for (const { sessionId } of open) if (sessionId) await recordCheckout(db, { checkout: await usePayments().expireCheckout(sessionId), now: new Date() })
    await lapseRun(db, { runId, now: new Date() })
  },
  'handle-payment-event': ({ eventId }, { db }) => handlePaymentEvent(db, usePayments(), { eventId, now: new Date() }),
  'charge-finished-run': ({ runId }, { db }) => chargeFinishedRun(db, usePayments(), { runId, now: new Date() }),
  'refund-deposit': ({ runId }, { db }) => refundDeposit(db, usePayments(), { runId, now: new Date() }),
  'render-invoice': async ({ invoiceId }, { db }) => renderInvoice(db, { files: useFileStore(), fonts: await readPdfFonts() }, invoiceId),
  'send-mail': (mail, { db }) => sendQueuedMail(db, { mail: useMail(), files: useFileStore() }, mail),
}
