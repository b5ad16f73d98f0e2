import { Auth, type AuthConfig } from '@auth/core'
import { CredentialsSignin } from '@auth/core/errors'
import Credentials from '@auth/core/providers/credentials'
import { defineEventHandler, getRequestURL, sendWebResponse } from 'h3'
import { DomainError } from '#shared/errors'
import { signInSchema } from '#shared/schemas/sign-in'
import { signIn, signOut } from '#server/services/people/sign-in'
import { useServerConfig } from '#server/utils/config'
import { BODY_LIMIT, readLimitedBody } from '#server/utils/body'
import { databaseReady } from '#server/utils/database'
import { sessionCookieName, usesSecureCookies } from '#server/utils/session'

/** Why a sign-in was refused, carried to the page as `code`. */
class TooManyTries extends CredentialsSignin {
  override code = 'too-many'
}

/**
 * Sign-in and sign-out by @auth/core. Its token holds only a secret; what the person may do is read from the
 * database on every request (server/middleware/2.session.ts), because a token alone cannot be revoked.
 */
export default defineEventHandler(async (event) => {
  if (event.path.startsWith('/api/auth/session')) return event.context.person ? { user: event.context.person, expires: '' } : {}
  const { origin } = useServerConfig()
  const url = new URL(getRequestURL(event).pathname + getRequestURL(event).search, origin)
  const headers = new Headers(event.headers)
  // Without it @auth/core answers a POST by redirecting, which the client's fetch would follow.
  if (event.method === 'POST') headers.set('x-auth-return-redirect', '1')
  const request = new Request(url, {
    method: event.method,
    headers,
    body: event.method === 'POST' ? new Uint8Array(await readLimitedBody(event, BODY_LIMIT.json)) : undefined,
  })
  return sendWebResponse(event, await Auth(request, authConfig()) as Response)
})

function authConfig(): AuthConfig {
  const secure = usesSecureCookies()
  return {
    basePath: '/api/auth',
    secret: useServerConfig().authSecret,
    trustHost: true,
    pages: { signIn: '/sign-in', error: '/sign-in' },
    session: { strategy: 'jwt', maxAge: 30 * 24 * 3600 },
    cookies: { sessionToken: { name: sessionCookieName(), options: { httpOnly: true, sameSite: 'lax', path: '/', secure } } },
    useSecureCookies: secure,
    logger: { error: () => undefined },
    providers: [Credentials({
      credentials: { email: {}, password: {} },
      authorize: async (credentials, request) => {
        const parsed = signInSchema.safeParse({ email: credentials.email, password: credentials.password })
        if (!parsed.success) return null
        const { db } = await databaseReady()
        try {
          const session = await signIn(db, { ...parsed.data, userAgent: request.headers.get('user-agent') ?? '', now: new Date() })
          return session && { id: session.personId, name: session.name, email: session.email, secret: session.secret }
        }
        catch (error) {
          if (error instanceof DomainError && error.code === 'too-many') throw new TooManyTries()
          throw error
        }
      },
    })],
    callbacks: {
      jwt: ({ token, user }) => user && 'secret' in user ? { sub: user.id, secret: user.secret } : token,
    },
    events: {
      signOut: async (message) => {
        if (!('token' in message) || typeof message.token?.secret !== 'string') return
        const { db } = await databaseReady()
        await signOut(db, { secret: message.token.secret, now: new Date() })
      },
    },
  }
}
