import { ApiError } from './errors'
import type { Fault, PaymentsStore } from './store'

const LONGEST_WAIT_MS = 85_000

/** The fault that meets this request, taken from what was asked for. */
export function takeFault(store: PaymentsStore, method: string, path: string): Fault | null {
  const { fault } = store
  if (!fault || fault.left <= 0 || method !== (fault.method ?? 'POST') || !path.startsWith(fault.path ?? '/v1/')) return null
  fault.left -= 1
  return fault
}

/** The provider's own error of a status. */
export function statusFault(status: number): ApiError {
  switch (status) {
    case 402: return new ApiError(402, { type: 'card_error', code: 'card_declined', decline_code: 'generic_decline', message: 'Your card was declined.' })
    case 409: return new ApiError(409, { type: 'invalid_request_error', code: 'lock_timeout', message: 'This object cannot be accessed right now because another request is accessing it.' })
    case 429: return new ApiError(429, { type: 'invalid_request_error', code: 'rate_limit', message: 'Request rate limit exceeded.' })
    default: return new ApiError(status, { type: 'api_error', message: 'An error at the provider, asked for by the controls.' })
  }
}

/** Waits as long as a hanging fault says. */
export async function hang(fault: Fault | null): Promise<void> {
  if (fault?.kind !== 'hang') return
  await new Promise<void>(resolve => void setTimeout(resolve, Math.min(LONGEST_WAIT_MS, fault.waitMs ?? 1000)).unref())
}
