import { describe, expect, it } from 'vitest'
import type { SessionPerson } from '#shared/types/session'
import { navigationOf } from '#shared/utils/navigation'

const person = (more: Partial<SessionPerson>): SessionPerson => ({ personId: 'p', name: 'A. Person', email: 'a@skerry.example', timeZone: null, isManager: false, isOperator: false, groups: [], ...more })
const group = (role: 'member' | 'pi') => ({ id: 'g1', name: 'Alder', class: 'academic' as const, role })
const labels = (more: Partial<SessionPerson>) => navigationOf(person(more)).map(item => item.label)

describe('the pages of the rail', () => {
  it('starts a manager at the desk and keeps people and helium for the facility', () => {
    expect(labels({ isManager: true })).toEqual(['Desk', 'Today', 'Board', 'Plan a run', 'Runs', 'Results', 'Samples', 'Helium', 'Invoices', 'Rates', 'People'])
  })
  it('starts an operator with today, and plans nothing in their name', () => {
    expect(labels({ isOperator: true })).toEqual(['Today', 'Board', 'Runs', 'Results', 'Samples', 'Helium', 'Rates'])
  })
  it('gives a visiting user no money and no facility pages', () => {
    expect(labels({ groups: [group('member')] })).toEqual(['Board', 'Plan a run', 'My runs', 'Results', 'Samples', 'Rates'])
  })
  it('leads a principal investigator to the account of the group they lead', () => {
    const items = navigationOf(person({ groups: [{ ...group('member'), id: 'g0' }, group('pi')] }))
    expect(items.find(item => item.label === 'Group account')?.to).toBe('/groups/g1')
    expect(items.map(item => item.label)).toContain('Invoices')
  })
})
