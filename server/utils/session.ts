import { getToken } from '@auth/core/jwt'
import type { H3Event } from 'h3'
import { getRequestHeader } from 'h3'
import { useServerConfig } from '#server/utils/config'

/** Whether cookies carry the Secure mark: whenever the facility is reached by https. */
export function usesSecureCookies(): boolean {
  return useServerConfig().origin.startsWith('https://')
}

/** `__Host-` binds the cookie to this host and path; browsers allow the prefix on https only. */
export function sessionCookieName(): string {
  return usesSecureCookies() ? '__Host-holdtime.session' : 'holdtime.session'
}

/**
 * The session secret inside the request's cookie.
 *
 * @returns the secret, or null when there is no cookie or it was not made by this server
 */
export async function readSessionSecret(event: H3Event): Promise<string | null> {
  const cookie = getRequestHeader(event, 'cookie')
  if (!cookie?.includes(sessionCookieName())) return null
  const token = await getToken({
    req: { headers: new Headers({ cookie }) },
    secret: useServerConfig().authSecret,
    salt: sessionCookieName(),
    cookieName: sessionCookieName(),
    secureCookie: usesSecureCookies(),
  })
  return typeof token?.secret === 'string' ? token.secret : null
}
