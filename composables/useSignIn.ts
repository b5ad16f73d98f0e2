/** Why a sign-in was refused, in words for the form. */
const REFUSALS: Record<string, string> = {
  'too-many': 'Too many failed tries for this address. Wait a few minutes, then try again.',
  'credentials': 'E-mail address and password do not match an account here. Check both and try again.',
}

/**
 * Signs in with e-mail and password. Posts by itself because the module's `signIn` drops the code that says why
 * a sign-in was refused.
 *
 * @returns a function that resolves with a sentence when refused, or null when signed in
 */
export function useSignIn() {
  const { getCsrfToken, getSession, data } = useAuth()
  return async (credentials: { email: string, password: string }): Promise<string | null> => {
    try {
      const body = new URLSearchParams({ ...credentials, csrfToken: await getCsrfToken(), callbackUrl: '/', json: 'true' })
      const reply = await $fetch<{ url: string }>('/api/auth/callback/credentials', { method: 'POST', body })
      await getSession()
      if (data.value?.user) return null
      const code = new URL(reply.url, 'http://localhost').searchParams.get('code') ?? 'credentials'
      return REFUSALS[code] ?? REFUSALS.credentials!
    }
    catch {
      return 'The server did not answer. Check the connection and try again; what you typed is kept.'
    }
  }
}
