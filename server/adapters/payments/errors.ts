import Stripe from 'stripe'
import { DomainError, type DomainErrorCode } from '#shared/errors'

const { StripeAuthenticationError, StripeCardError, StripeIdempotencyError, StripeInvalidRequestError, StripePermissionError, StripeError } = Stripe.errors

/** Does a request and words the provider's errors as ours; what else goes wrong stays as it is. */
export async function asking<T>(request: () => Promise<T>): Promise<T> {
  try {
    return await request()
  }
  catch (error) {
    throw error instanceof StripeError ? ours(error) : error
  }
}

function ours(error: InstanceType<typeof StripeError>): DomainError {
  const [code, sentence] = wordsFor(error)
  return Object.assign(new DomainError(code, sentence), { cause: error })
}

function wordsFor(error: InstanceType<typeof StripeError>): [DomainErrorCode, string] {
  if (error.statusCode === 429) return ['unavailable', 'The payment provider is busy. Try again in a minute; nothing is charged twice.']
  // Two of our own requests met at the provider; the second finds the first one's answer when it asks again.
  if (error.statusCode === 409) return ['unavailable', 'This payment is being worked on. Wait a moment and try again.']
  if (error instanceof StripeAuthenticationError || error instanceof StripePermissionError) return ['unavailable', 'The payment provider does not accept the facility\'s key. Tell the facility; nothing was charged.']
  if (error instanceof StripeIdempotencyError) return ['conflict', 'This payment was begun with other details. Reload the page and begin again.']
  if (error instanceof StripeCardError) return ['conflict', 'The card was declined. Use another card.']
  if (error instanceof StripeInvalidRequestError) return ['invalid', `The payment provider refused this request: ${error.message}`]
  return ['unavailable', 'The payment provider does not answer at the moment. Try again in a minute; nothing is charged twice.']
}
