import type Stripe from 'stripe'

/** An error as the provider words it. */
export class ApiError extends Error {
  constructor(readonly status: number, readonly body: { type: string, message: string, code?: string, decline_code?: string, param?: string, payment_intent?: Stripe.PaymentIntent }, readonly headers: Record<string, string> = {}) {
    super(body.message)
  }
}

export const notFound = (kind: string, id: string) => new ApiError(404, { type: 'invalid_request_error', code: 'resource_missing', message: `No such ${kind}: '${id}'`, param: 'id' })

export const invalid = (message: string, param?: string) => new ApiError(400, { type: 'invalid_request_error', message, ...(param ? { param } : {}) })
