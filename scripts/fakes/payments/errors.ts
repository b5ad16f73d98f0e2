import type Stripe from 'stripe'

/** An error as the provider words it. */
export interface ErrorBody { type: string, message: string, code?: string, decline_code?: string, param?: string, payment_intent?: Stripe.PaymentIntent }

/** An answer that is an error. */
export class ApiError extends Error {
  constructor(readonly status: number, readonly body: ErrorBody, readonly headers: Record<string, string> = {}) {
    super(body.message)
  }
}

export const notFound = (kind: string, id: string) => new ApiError(404, { type: 'invalid_request_error', code: 'resource_missing', message: `No such ${kind}: '${id}'`, param: 'id' })

export const invalid = (message: string, param?: string, code?: string) => new ApiError(400, { type: 'invalid_request_error', message, ...(param ? { param } : {}), ...(code ? { code } : {}) })

/** The object with an id, or the provider's "No such …". */
export function find<T>(map: Map<string, T>, kind: string, id: string | undefined): T {
  const found = map.get(id ?? '')
  if (!found) throw notFound(kind, id ?? '')
  return found
}
