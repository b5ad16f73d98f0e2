import { getRequestHeader } from 'h3'
import { useServerConfig } from '#server/utils/config'

const UNSAFE = new Set(['POST', 'PUT', 'PATCH', 'DELETE'])

/** Refuses changes that another site's page sends with our cookie. (Body sizes are limited where bodies are read.) */
export default defineEventHandler((event) => {
  if (!UNSAFE.has(event.method) || event.path.startsWith('/api/payments/webhook')) return
  const site = getRequestHeader(event, 'sec-fetch-site')
  const origin = getRequestHeader(event, 'origin')
  const host = getRequestHeader(event, 'host')
  const ownOrigin = origin === undefined || [useServerConfig().origin, `http://${host}`, `https://${host}`].includes(origin)
  if ((site && site !== 'same-origin' && site !== 'none') || !ownOrigin) {
    throw createError({ statusCode: 403, statusMessage: 'Cross-site', message: 'This change was sent from another site and was refused.', data: { code: 'not-allowed', issues: [] } })
  }
})
