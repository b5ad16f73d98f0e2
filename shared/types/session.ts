/** A group as the session carries it. */
export interface SessionGroup {
  id: string
  name: string
  class: 'internal' | 'academic' | 'industry'
  role: 'member' | 'pi'
}

/** The signed-in person as pages and the server see them. */
export interface SessionPerson {
  personId: string
  name: string
  email: string
  /** The person's own zone, where it is not the facility's. */
  timeZone: string | null
  isManager: boolean
  isOperator: boolean
  groups: SessionGroup[]
}
