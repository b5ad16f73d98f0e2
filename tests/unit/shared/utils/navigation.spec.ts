import { describe, expect, it } from 'vitest'
import type { SessionPerson } from '#shared/types/session'
import { navigationOf } from '#shared/utils/navigation'
import { runNumber } from '#shared/utils/run-number'

const person = (more: Partial<SessionPerson> = {}): SessionPerson => ({ personId: 'p', name: 'Ada', email: 'ada@example.org', timeZone: null, isManager: false, isOperator: false, groups: [], ...more })
const alder = (role: 'member' | 'pi') => ({ id: 'alder', name: 'Alder', class: 'academic' as const, role })
const labels = (who: SessionPerson) => navigationOf(who).map(({ label }) => label)

describe('the pages of the rail', () => {
  it('are those of each role', () => {
    expect(labels(person({ isManager: true }))).toEqual(['Desk', 'Today', 'Board', 'Plan a run', 'Runs', 'Results', 'Samples', 'Helium', 'Invoices', 'Rates', 'People'])
    expect(labels(person({ isOperator: true }))).toEqual(['Today', 'Board', 'Runs', 'Results', 'Samples', 'Helium', 'Rates'])
    expect(labels(person({ groups: [alder('pi')] }))).toEqual(['Board', 'Plan a run', 'My runs', 'Results', 'Samples', 'Invoices', 'Group account', 'Rates'])
    expect(labels(person({ groups: [alder('member')] }))).toEqual(['Board', 'Plan a run', 'My runs', 'Results', 'Samples', 'Rates'])
    expect(labels(person())).toEqual(['Board', 'My runs', 'Results', 'Samples', 'Rates'])
  })

  it('add up for a person of several roles', () => {
    expect(labels(person({ isOperator: true, groups: [alder('pi')] }))).toEqual(['Today', 'Board', 'Plan a run', 'Runs', 'Results', 'Samples', 'Helium', 'Invoices', 'Group account', 'Rates'])
  })

  it('lead a PI to the group they lead', () => {
    const both = person({ groups: [{ ...alder('member'), id: 'cedar' }, alder('pi')] })
    expect(navigationOf(both).find(({ label }) => label === 'Group account')?.to).toBe('/groups/alder')
  })
})

describe('the number of a run', () => {
  it.each([[1, '0001'], [218, '0218'], [9999, '9999'], [12345, '12345']])('%i is %s', (number, text) => {
    expect(runNumber(number)).toBe(text)
  })
})
