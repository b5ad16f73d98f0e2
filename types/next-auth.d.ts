import type { SessionPerson } from '../shared/types/session'

/** The module's own types come from next-auth, which is not installed; this is the shape our session route sends. */
declare module 'next-auth' {
  interface Session {
    user: SessionPerson
    expires: string
  }
}

declare module 'next-auth/react' {
  interface SignInOptions extends Record<string, unknown> {
    callbackUrl?: string
    redirect?: boolean
  }
}
