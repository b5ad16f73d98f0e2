import type { SessionPerson } from '../shared/types/session'

declare module 'h3' {
  interface H3EventContext {
    /** Id shared by log lines, audit rows and error messages of one request. */
    requestId: string
    /** The signed-in person, put there by server/middleware/2.session.ts. */
    person?: SessionPerson
  }
}

export {}
