// The sign-in module takes its types from next-auth, which is not installed; these are the shapes our session route sends.
declare module 'next-auth' {
  import type { SessionPerson } from '#shared/types/session'

  export interface Session {
    user: SessionPerson
    expires: string
  }
}

declare module 'next-auth/providers/index' {
  export type BuiltInProviderType = string
  export type AppProvider = { id: string, type: string }
}
