import { createServer, type IncomingMessage, type ServerResponse } from 'node:http'
import { answerApi } from './api'
import { controls } from './controls'
import { ApiError } from './errors'
import { decodeForm, textAt } from './form'
import { rememberedAnswer, startAnswer } from './idempotency'
import { renderChallengePage, renderPayPage } from './pay-page'
import { payOnPage } from './sessions'
import { PaymentsStore } from './store'
import { Webhooks } from './webhooks'

/** How the fake is started. */
export interface PaymentsFakeOptions { port: number, host?: string, webhookUrl: string, webhookSecret: string, apiKey?: string }

/** A running fake. */
export interface PaymentsFake { url: string, port: number, store: PaymentsStore, close(): Promise<void> }

/** Starts a stateful stand-in of the payment provider that speaks its HTTP API to the unchanged SDK, on loopback. */
export async function startPaymentsFake(options: PaymentsFakeOptions): Promise<PaymentsFake> {
  const store = new PaymentsStore()
  const webhooks = new Webhooks(store, { url: options.webhookUrl, secret: options.webhookSecret })
  const url = `http://127.0.0.1:${options.port}`
  const server = createServer((request, response) => {
    void handle({ store, webhooks, url, apiKey: options.apiKey }, request, response).catch((error: unknown) => {
      response.writeHead(500).end(String(error))
    })
  })
  await new Promise<void>((resolve, reject) => server.once('error', reject).listen(options.port, options.host ?? '127.0.0.1', resolve))
  return {
    url, port: options.port, store,
    close: () => new Promise((resolve) => {
      webhooks.close()
      server.closeAllConnections()
      server.close(() => resolve())
    }),
  }
}

interface Fake { store: PaymentsStore, webhooks: Webhooks, url: string, apiKey?: string }

async function handle(fake: Fake, request: IncomingMessage, response: ServerResponse): Promise<void> {
  const url = new URL(request.url ?? '/', fake.url)
  const body = await readBody(request)
  if (url.pathname.startsWith('/_fake')) return controls(fake.store, fake.webhooks, request.method ?? 'GET', url, body, response)
  if (url.pathname.startsWith('/pay/')) return handlePayPage(fake, request, url, body, response)
  if (url.pathname.startsWith('/v1/')) return handleApi(fake, request, url, body, response)
  response.writeHead(404).end()
}

async function readBody(request: IncomingMessage): Promise<string> {
  const chunks: Buffer[] = []
  for await (const chunk of request) chunks.push(chunk as Buffer)
  return Buffer.concat(chunks).toString('utf8')
}

function handleApi(fake: Fake, request: IncomingMessage, url: URL, body: string, response: ServerResponse): void {
  const { store } = fake
  const requestId = store.newId('req')
  const send = (status: number, text: string, headers: Record<string, string> = {}) => response.writeHead(status, { 'content-type': 'application/json', 'request-id': requestId, ...headers }).end(text)
  const fail = (error: ApiError) => send(error.status, JSON.stringify({ error: error.body }), error.headers)
  const method = request.method ?? 'GET'
  const key = method === 'POST' ? request.headers['idempotency-key'] as string | undefined : undefined
  try {
    checkKey(fake, request)
    const fault = method === 'POST' && store.fault && store.fault.left > 0 ? store.fault : null
    if (fault) fault.left -= 1
    if (fault?.kind === 'close-before') return void request.socket.destroy()
    if (fault?.kind === 'status') throw new ApiError(fault.status ?? 500, { type: fault.status === 402 ? 'card_error' : 'api_error', message: 'A fault that was asked for.', ...(fault.status === 402 ? { code: 'card_declined' } : {}) })
    const kept = key ? rememberedAnswer(store, key, `${url.pathname}\n${body}`) : null
    if (kept) return void send(kept.status, kept.body, { 'idempotent-replayed': 'true' })
    const finish = key ? startAnswer(store, key, `${url.pathname}\n${body}`) : null
    let answer: { status: number, text: string }
    try {
      const reply = answerApi(store, fake.webhooks, id => `${fake.url}/pay/${id}`, { method, path: url.pathname.slice(4).split('/').filter(Boolean), form: decodeForm(body), query: url.searchParams })
      answer = { status: 200, text: JSON.stringify(reply) }
    }
    catch (error) {
      if (!(error instanceof ApiError)) throw error
      answer = { status: error.status, text: JSON.stringify({ error: error.body }) }
    }
    // Nothing is kept when the request itself was not valid.
    finish?.(answer.status === 400 || answer.status === 404 ? null : answer)
    if (fault?.kind === 'close-after') return void request.socket.destroy()
    send(answer.status, answer.text)
  }
  catch (error) {
    if (!(error instanceof ApiError)) throw error
    fail(error)
  }
}

function checkKey(fake: Fake, request: IncomingMessage) {
  const authorization = request.headers.authorization ?? ''
  const given = authorization.startsWith('Basic ') ? Buffer.from(authorization.slice(6), 'base64').toString().split(':')[0] : authorization.replace(/^Bearer /, '')
  if (!given || (fake.apiKey && given !== fake.apiKey)) throw new ApiError(401, { type: 'invalid_request_error', message: 'Invalid API Key provided.' })
}

function handlePayPage(fake: Fake, request: IncomingMessage, url: URL, body: string, response: ServerResponse): void {
  const { store, webhooks } = fake
  const [, , id = '', isChallenge] = url.pathname.split('/')
  const session = store.sessions.get(id)
  const html = (text: string, status = 200) => response.writeHead(status, { 'content-type': 'text/html; charset=utf-8' }).end(text)
  if (!session) return void html('No such payment.', 404)
  if (request.method !== 'POST' || session.status !== 'open') return void html(isChallenge ? renderChallengePage() : renderPayPage(session))
  const choice = textAt(decodeForm(body), 'do')
  const go = (target: string) => response.writeHead(303, { location: target }).end()
  const success = session.success_url?.replace('{CHECKOUT_SESSION_ID}', session.id) ?? '/'
  switch (choice) {
    case 'pay':
    case 'confirm':
      payOnPage(store, webhooks, session, 'pay')
      return void go(success)
    case 'challenge':
      payOnPage(store, webhooks, session, 'challenge')
      return void go(`/pay/${id}/challenge`)
    default:
      payOnPage(store, webhooks, session, 'decline')
      return void html(renderPayPage(session, choice === 'refuse' ? 'Your bank did not confirm the payment. Try again or use another card.' : 'Your card was declined. Try again or use another card.'))
  }
}
