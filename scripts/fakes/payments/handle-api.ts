import type { IncomingMessage, ServerResponse } from 'node:http'
import { answerApi } from './api'
import { ApiError } from './errors'
import { hang, statusFault, takeFault } from './faults'
import { decodeForm } from './form'
import { rememberedAnswer, startAnswer } from './idempotency'
import type { Fake } from './server'
import type { Fault } from './store'

/** Speaks the provider's HTTP API: key, idempotency, faults, errors and headers around the endpoints. */
export async function handleApi(fake: Fake, request: IncomingMessage, url: URL, body: string, response: ServerResponse): Promise<void> {
  const { store } = fake
  const method = request.method ?? 'GET'
  const headers = { 'content-type': 'application/json', 'request-id': store.newId('req'), 'stripe-version': String(request.headers['stripe-version'] ?? '') }
  const send = (status: number, text: string, more: Record<string, string> = {}) => void response.writeHead(status, { ...headers, ...more }).end(text)
  try {
    checkKey(fake, request)
    const fault = takeFault(store, method, url.pathname)
    if (fault?.kind === 'close-before') return void request.socket.destroy()
    const key = method === 'POST' ? request.headers['idempotency-key'] as string | undefined : undefined
    const fingerprint = `${url.pathname}\n${body}`
    const kept = key ? rememberedAnswer(store, key, fingerprint) : null
    if (kept) return send(kept.status, kept.body, { 'idempotent-replayed': 'true' })
    const keep = key ? startAnswer(store, key, fingerprint) : null
    await hang(fault)
    const answer = work(fake, method, url, body, fault)
    keep?.(answer)
    if (fault?.kind === 'close-after') return void request.socket.destroy()
    send(answer.status, answer.text)
  }
  catch (error) {
    if (!(error instanceof ApiError)) throw error
    send(error.status, JSON.stringify({ error: error.body }), error.headers)
  }
}

function work(fake: Fake, method: string, url: URL, body: string, fault: Fault | null): { status: number, text: string } {
  try {
    if (fault?.kind === 'status') throw statusFault(fault.status ?? 500)
    const form = { ...decodeForm(url.search.slice(1)), ...decodeForm(body) }
    const reply = answerApi(fake.store, fake.webhooks, id => `${fake.publicUrl}/pay/${id}`, { method, path: url.pathname.slice('/v1/'.length), form })
    return { status: 200, text: JSON.stringify(reply) }
  }
  catch (error) {
    if (!(error instanceof ApiError)) throw error
    return { status: error.status, text: JSON.stringify({ error: error.body }) }
  }
}

function checkKey(fake: Fake, request: IncomingMessage) {
  const authorization = request.headers.authorization ?? ''
  const given = authorization.startsWith('Basic ') ? Buffer.from(authorization.slice(6), 'base64').toString().split(':')[0] : authorization.replace(/^Bearer /, '')
  if (!given || (fake.apiKey && given !== fake.apiKey)) throw new ApiError(401, { type: 'invalid_request_error', message: 'Invalid API Key provided.' })
}
