import { createServer, type IncomingMessage, type ServerResponse } from 'node:http'
import type { AddressInfo } from 'node:net'
import { controls } from './controls'
import { handleApi } from './handle-api'
import { handlePayPage } from './handle-pay-page'
import { expireOverdue } from './sessions'
import { keepState } from './state'
import { PaymentsStore } from './store'
import { Webhooks } from './webhooks'

/** How the fake is started. */
export interface PaymentsFakeOptions {
  port: number
  webhookUrl: string
  webhookSecret: string
  apiKey?: string
  /** Where it keeps what it knows, so that it remembers payments over a restart as the real provider does. */
  stateFile?: string
  /** For containers; without them it listens on loopback. */
  host?: string
  publicUrl?: string
}

/** A running fake. */
export interface PaymentsFake { url: string, port: number, store: PaymentsStore, close(): Promise<void> }

/** What every part of a running fake shares. */
export interface Fake { store: PaymentsStore, webhooks: Webhooks, publicUrl: string, apiKey?: string }

const LARGEST_BODY = 1_000_000
const EXPIRE_EVERY_MS = 1000

/**
 * Starts a stateful stand-in of the payment provider that speaks its HTTP API to the unchanged SDK.
 *
 * @param options port (0 takes a free one), where events go and what signs them
 */
export async function startPaymentsFake(options: PaymentsFakeOptions): Promise<PaymentsFake> {
  const { host = '127.0.0.1' } = options
  const store = new PaymentsStore()
  const state = keepState(options.stateFile, store)
  const webhooks = new Webhooks(store, { url: options.webhookUrl, secret: options.webhookSecret })
  const fake: Fake = { store, webhooks, publicUrl: '', apiKey: options.apiKey }
  const server = createServer((request, response) => {
    if (request.method === 'POST') response.once('close', state.changed)
    void handle(fake, request, response).catch((error: unknown) => {
      if (!response.headersSent) response.writeHead(500, { 'content-type': 'text/plain' })
      response.end(String(error))
    })
  })
  await new Promise<void>((resolve, reject) => server.once('error', reject).listen(options.port, host, resolve))
  const { port } = server.address() as AddressInfo
  const url = `http://127.0.0.1:${port}`
  fake.publicUrl = options.publicUrl?.replace(/\/$/, '') ?? url
  const expiring = setInterval(() => expireOverdue(store, webhooks), EXPIRE_EVERY_MS).unref()
  return {
    url, port, store,
    close: () => new Promise((resolve) => {
      clearInterval(expiring)
      webhooks.close()
      state.close()
      server.close(() => resolve())
      server.closeAllConnections()
    }),
  }
}

async function handle(fake: Fake, request: IncomingMessage, response: ServerResponse): Promise<void> {
  const url = new URL(request.url ?? '/', fake.publicUrl)
  const body = await readBody(request)
  if (body === null) response.writeHead(413).end()
  else if (url.pathname.startsWith('/_fake')) controls(fake.store, fake.webhooks, request.method ?? 'GET', url, body, response)
  else if (url.pathname.startsWith('/pay/')) handlePayPage(fake, request, url, body, response)
  else if (url.pathname.startsWith('/v1/')) await handleApi(fake, request, url, body, response)
  else response.writeHead(404).end()
}

async function readBody(request: IncomingMessage): Promise<string | null> {
  const chunks: Buffer[] = []
  let bytes = 0
  for await (const chunk of request) {
    bytes += (chunk as Buffer).length
    if (bytes > LARGEST_BODY) return null
    chunks.push(chunk as Buffer)
  }
  return Buffer.concat(chunks).toString('utf8')
}
