import type { H3Event } from 'h3'
import { createError } from 'h3'
import { DomainError } from '#shared/errors'

/** Limits in bytes by kind of body. */
export const BODY_LIMIT = { json: 1_000_000, upload: 50_000_000 } as const

/** A body over the limit is read on and thrown away up to this many times the limit, so that the sender can read the refusal. */
const DRAIN_FACTOR = 4

/**
 * Reads a request body, counting the bytes that come and not those announced.
 *
 * @param event the request
 * @param limitBytes more than this is refused with 413 and kept no longer
 * @throws DomainError `invalid` when the sender breaks off
 */
export function readLimitedBody(event: H3Event, limitBytes: number): Promise<Buffer> {
  const { req } = event.node
  const brokenOff = new DomainError('invalid', 'The request was broken off before it was complete. Send it again.')
  if (req.destroyed) return Promise.reject(brokenOff)
  return new Promise((resolve, reject) => {
    const chunks: Buffer[] = []
    let received = 0
    req.on('data', (chunk: Buffer) => {
      received += chunk.length
      if (received <= limitBytes) return void chunks.push(chunk)
      chunks.length = 0
      reject(bodyTooLarge(limitBytes))
      if (received > DRAIN_FACTOR * limitBytes) req.destroy()
    })
    req.once('end', () => resolve(Buffer.concat(chunks)))
    req.once('close', () => reject(brokenOff))
    req.once('error', reject)
  })
}

function bodyTooLarge(limitBytes: number) {
  const message = `This is larger than ${limitBytes / 1_000_000} MB. Split it, or leave out what is not needed.`
  return createError({ statusCode: 413, statusMessage: 'Too large', message, data: { code: 'invalid', issues: [] } })
}
