import Stripe from 'stripe'
import { DomainError } from '#shared/errors'
import type { PaymentEvent } from './types'

const SIGNATURE_TOLERANCE_S = 300

/** Verifies an event on its raw bytes with any of the secrets, so that one can be replaced while the other still signs. */
export function readEvent(stripe: Stripe, secrets: readonly string[], rawBody: Buffer, signature: string): PaymentEvent {
  for (const secret of secrets) {
    const event = verify(stripe, secret, rawBody, signature)
    if (event) return event
  }
  throw new DomainError('invalid', 'The signature of this event does not fit. It was not taken.')
}

function verify(stripe: Stripe, secret: string, rawBody: Buffer, signature: string): PaymentEvent | null {
  try {
    const event = stripe.webhooks.constructEvent(rawBody, signature, secret, SIGNATURE_TOLERANCE_S)
    const object = event.data.object as { id?: string }
    return { id: event.id, type: event.type, objectId: object.id ?? '', payload: event as unknown as Record<string, unknown> }
  }
  catch (error) {
    if (error instanceof Stripe.errors.StripeSignatureVerificationError) return null
    if (error instanceof SyntaxError || error instanceof TypeError) throw new DomainError('invalid', 'This is not an event of the payment provider. It was not taken.')
    throw error
  }
}
