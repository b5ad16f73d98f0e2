import { randomUUID } from 'node:crypto'

/** Gives each request an id that log lines, audit rows and error messages share. */
export default defineEventHandler((event) => {
  event.context.requestId = randomUUID()
  setResponseHeader(event, 'x-request-id', event.context.requestId)
})
