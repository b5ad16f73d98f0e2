import type { SessionPerson } from '#shared/types/session'

/** A role a page may ask for in `definePageMeta({ roles: [...] })`; any one of them is enough. */
export type PageRole = 'manager' | 'operator' | 'pi' | 'user'

/** The roles a person has for pages. */
export function rolesOf(person: SessionPerson): PageRole[] {
  const roles: PageRole[] = []
  if (person.isManager) roles.push('manager')
  if (person.isOperator) roles.push('operator')
  if (person.groups.some(group => group.role === 'pi')) roles.push('pi')
  if (person.groups.length > 0) roles.push('user')
  return roles
}

/** Whether a person may open a page that asks for these roles; no roles means everybody signed in. */
export function mayOpen(person: SessionPerson, roles: PageRole[] | undefined): boolean {
  return !roles || rolesOf(person).some(role => roles.includes(role))
}

/** The first page of a person after signing in. */
export function homeOf(person: SessionPerson): string {
  if (person.isManager) return '/desk'
  if (person.isOperator) return '/today'
  const ledGroup = person.groups.find(group => group.role === 'pi')
  return ledGroup ? `/groups/${ledGroup.id}` : '/runs'
}
