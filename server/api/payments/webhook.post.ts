import { getRequestHeader, setResponseStatus } from 'h3'
import { DomainError } from '#shared/errors'
import { takePaymentEvent } from '#server/services/payments/take-event'
import { BODY_LIMIT, readLimitedBody } from '#server/utils/body'
import { definePublicApi } from '#server/utils/define-api'
import { usePayments } from '#server/utils/services'

/** Takes an event of the payment provider: verified on the raw bytes, stored once, answered at once. */
export default definePublicApi({ why: 'the provider\'s signature is verified' }, async ({ event, db }) => {
  const body = await readLimitedBody(event, BODY_LIMIT.json)
  try {
    const isNew = await takePaymentEvent(db, usePayments().readEvent(body, getRequestHeader(event, 'stripe-signature') ?? ''))
    return { received: true, isNew }
  }
  catch (error) {
    if (!(error instanceof DomainError)) throw error
    setResponseStatus(event, 400)
    return { received: false, message: error.message }
  }
})
