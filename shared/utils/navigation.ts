import type { SessionPerson } from '#shared/types/session'

/** One entry of the rail. */
export interface NavigationItem { label: string, to: string, short?: string }

/** The pages a person works with, in the order of their day. */
export function navigationOf(person: SessionPerson): NavigationItem[] {
  const facility = person.isManager || person.isOperator
  const led = person.groups.find(group => group.role === 'pi')
  const plans = person.isManager || person.groups.length > 0
  const items: (NavigationItem | false)[] = [
    person.isManager && { label: 'Desk', to: '/desk' },
    facility && { label: 'Today', to: '/today' },
    { label: 'Board', to: '/board' },
    plans && { label: 'Plan a run', short: 'Plan', to: '/plan' },
    { label: facility ? 'Runs' : 'My runs', short: 'Runs', to: '/runs' },
    { label: 'Results', to: '/results' },
    { label: 'Samples', to: '/samples' },
    facility && { label: 'Helium', to: '/helium' },
    (person.isManager || led !== undefined) && { label: 'Invoices', to: '/invoices' },
    led !== undefined && { label: 'Group account', short: 'Group', to: `/groups/${led.id}` },
    { label: 'Rates', to: '/rates' },
    person.isManager && { label: 'People', to: '/people' },
  ]
  return items.filter((item): item is NavigationItem => item !== false)
}
