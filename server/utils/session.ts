import { getToken } from '@auth/core/jwt'
import type { H3Event } from 'h3'
import { getCookie } from 'h3'
import { useServerConfig } from '#server/utils/config'

/** Whether cookies carry the Secure mark: whenever the facility is reached by https. */
export function usesSecureCookies(): boolean {
  return useServerConfig().origin.startsWith('https://')
}

/** `__Host-` binds the cookie to this host and path; browsers allow the prefix on https only. */
export function sessionCookieName(): string {
  return usesSecureCookies() ? '__Host-holdtime.session' : 'holdtime.session'
}

// Opening a cookie costs as much as the look-up behind it, and the same cookie always opens to the same secret. What the
// secret may do is still read from the database on every request.
const opened = new Map<string, string>()
const MOST_OPENED = 2000

/**
 * The session secret inside the request's cookie.
 *
 * @returns the secret, or null when there is no cookie or it was not made by this server
 */
export async function readSessionSecret(event: H3Event): Promise<string | null> {
  const name = sessionCookieName()
  const cookie = getCookie(event, name)
  if (!cookie) return null
  const known = opened.get(cookie)
  if (known) return known
  const token = await getToken({
    req: { headers: new Headers({ cookie: `${name}=${cookie}` }) }, secret: useServerConfig().authSecret, salt: name, cookieName: name, secureCookie: usesSecureCookies(),
  })
  if (typeof token?.secret !== 'string') return null
  // The oldest goes first: a Map keeps the order of insertion.
  if (opened.size >= MOST_OPENED) opened.delete(opened.keys().next().value!)
  opened.set(cookie, token.secret)
  return token.secret
}
