import type { H3Event } from 'h3'
import { createError } from 'h3'

/** Limits in bytes by kind of body. */
export const BODY_LIMIT = { json: 1_000_000, upload: 50_000_000 } as const

/**
 * Reads a request body, counting the bytes that come and not those announced.
 *
 * @param event the request
 * @param limitBytes more than this is refused with 413 and the reading stops
 */
export async function readLimitedBody(event: H3Event, limitBytes: number): Promise<Buffer> {
  const chunks: Buffer[] = []
  let received = 0
  for await (const chunk of event.node.req) {
    received += (chunk as Buffer).length
    if (received > limitBytes) throw bodyTooLarge(limitBytes)
    chunks.push(chunk as Buffer)
  }
  return Buffer.concat(chunks)
}

function bodyTooLarge(limitBytes: number) {
  const message = `This is larger than ${limitBytes / 1_000_000} MB. Split it, or leave out what is not needed.`
  return createError({ statusCode: 413, statusMessage: 'Too large', message, data: { code: 'invalid', issues: [] } })
}
