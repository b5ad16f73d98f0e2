import { inject } from 'vitest'
import type { DemoSignIn, TestServer } from './server'

/** A browser's worth of HTTP: keeps cookies, sends JSON, never throws on a status. */
export interface ApiClient {
  request<T = unknown>(method: string, path: string, body?: unknown, headers?: Record<string, string>): Promise<{ status: number, body: T, headers: Headers }>
  get<T = unknown>(path: string): Promise<{ status: number, body: T, headers: Headers }>
  post<T = unknown>(path: string, body?: unknown): Promise<{ status: number, body: T, headers: Headers }>
  cookies: Map<string, string>
}

/** The demo account for a role as the seed names it, e.g. `manager` or `PI, Alder group (academic)`. */
export function demoSignIn(as: string, server: TestServer = inject('server')): DemoSignIn {
  const found = server.signIns.find(account => account.as === as) ?? server.signIns.find(account => account.as.startsWith(as))
  if (!found) throw new Error(`no demo account "${as}"; there are: ${server.signIns.map(account => account.as).join('; ')}`)
  return found
}

/** A client that is not signed in. */
export function anonymousClient(origin: string = inject('server').origin): ApiClient {
  const cookies = new Map<string, string>()
  const request: ApiClient['request'] = async (method, path, body, headers = {}) => {
    const isForm = body instanceof FormData || body instanceof URLSearchParams
    const reply = await fetch(new URL(path, origin), {
      method,
      redirect: 'manual',
      headers: { cookie: [...cookies].map(([name, value]) => `${name}=${value}`).join('; '), ...(body !== undefined && !isForm ? { 'content-type': 'application/json' } : {}), ...headers },
      body: body === undefined ? undefined : isForm ? body : JSON.stringify(body),
    })
    for (const line of reply.headers.getSetCookie()) {
      const [pair = ''] = line.split(';')
      const at = pair.indexOf('=')
      cookies.set(pair.slice(0, at), pair.slice(at + 1))
    }
    const text = await reply.text()
    const isJson = reply.headers.get('content-type')?.includes('json')
    return { status: reply.status, body: (isJson && text ? JSON.parse(text) : text) as never, headers: reply.headers }
  }
  return { request, cookies, get: path => request('GET', path), post: (path, body = {}) => request('POST', path, body) }
}

/** A client signed in as a demo account, by the same calls that the sign-in page makes. */
export async function signedInClient(as: string, server: TestServer = inject('server')): Promise<ApiClient> {
  const account = demoSignIn(as, server)
  const client = anonymousClient(server.origin)
  const { body: csrf } = await client.get<{ csrfToken: string }>('/api/auth/csrf')
  await client.request('POST', '/api/auth/callback/credentials', new URLSearchParams({ email: account.email, password: account.password, csrfToken: csrf.csrfToken, callbackUrl: '/' }))
  const session = await client.get<{ user?: unknown }>('/api/auth/session')
  if (!session.body.user) throw new Error(`${as} could not sign in`)
  return client
}
