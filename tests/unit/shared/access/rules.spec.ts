import { describe, expect, it } from 'vitest'
import { ACTIONS, can, hasFacilityRole, type Action, type Actor } from '#shared/access/rules'

const OWN = 'group-alder'
const OTHER = 'group-cedar'
const person = (fields: Partial<Actor>): Actor => ({ personId: 'somebody', isManager: false, isOperator: false, memberships: [], ...fields })

const manager = person({ isManager: true })
const operator = person({ isOperator: true })
const pi = person({ memberships: [{ groupId: OWN, role: 'pi' }] })
const owner = person({ personId: 'owner', memberships: [{ groupId: OWN, role: 'member' }] })
const member = person({ memberships: [{ groupId: OWN, role: 'member' }] })
/** Leads another group: what a PI may do there must not reach over. */
const otherPi = person({ memberships: [{ groupId: OTHER, role: 'pi' }] })
/** Asked for the run, and has left the group since. */
const left = person({ personId: 'owner', memberships: [{ groupId: OTHER, role: 'member' }] })

const actors = { manager, operator, pi, owner, member, otherPi, left }
type Who = keyof typeof actors
const EVERYBODY = Object.keys(actors) as Who[]
const GROUP: Who[] = ['pi', 'owner', 'member']
const FACILITY: Who[] = ['manager', 'operator']

/** Who may act on an object of the group Alder that `owner` made; written from the roles of the product, not from the code. */
const ON_GROUP_OBJECT: Record<Action, Who[]> = {
  'board:read': EVERYBODY,
  'closure:read': EVERYBODY,
  'closure:write': ['manager'],
  'cryostat:read': EVERYBODY,
  'run:ask': ['manager', ...GROUP],
  'run:read': [...FACILITY, ...GROUP],
  'run:withdraw': ['manager', 'pi', 'owner'],
  'run:approve': ['manager'],
  'run:decline': ['manager'],
  'run:pay': GROUP,
  'run:log': FACILITY,
  'run:advance': FACILITY,
  'run:finish': FACILITY,
  'sample:read': [...FACILITY, ...GROUP],
  'sample:write': ['manager', ...GROUP],
  'dataset:read': [...FACILITY, ...GROUP],
  'dataset:upload': [...FACILITY, ...GROUP],
  'analysis:read': [...FACILITY, ...GROUP],
  'analysis:write': [...FACILITY, ...GROUP],
  'analysis:sign': ['manager', 'pi'],
  'analysis:comment': [...FACILITY, ...GROUP],
  'heat-capacity:check': EVERYBODY,
  'invoice:read': ['manager', 'pi'],
  'invoice:issue': ['manager'],
  'rates:read': EVERYBODY,
  'rates:write': ['manager'],
  'helium:read': FACILITY,
  'helium:write': FACILITY,
  'group:read': ['manager', 'pi'],
  'group:write': ['manager'],
  'people:read': ['manager'],
  'people:write': ['manager'],
  'desk:read': ['manager'],
  'today:read': FACILITY,
  // Sessions have no group: see below.
  'session:own': ['owner'],
}

/** Who may act where the object belongs to the facility and to no group. */
const ON_FACILITY_OBJECT: Record<Action, Who[]> = {
  ...Object.fromEntries(ACTIONS.map(action => [action, ON_GROUP_OBJECT[action].filter(who => FACILITY.includes(who))])) as Record<Action, Who[]>,
  'board:read': EVERYBODY,
  'closure:read': EVERYBODY,
  'cryostat:read': EVERYBODY,
  'heat-capacity:check': EVERYBODY,
  'rates:read': EVERYBODY,
}

const allowed = (action: Action, object: Parameters<typeof can>[2]) => EVERYBODY.filter(who => can(actors[who], action, object))
const sorted = (who: Who[]) => EVERYBODY.filter(name => who.includes(name))

describe('the table of rights', () => {
  it.each(ACTIONS)('%s on an object of a group', (action) => {
    expect(allowed(action, { groupId: OWN, ownerId: 'owner' })).toEqual(sorted(ON_GROUP_OBJECT[action]))
  })

  it.each(ACTIONS)('%s on an object of the facility', (action) => {
    expect(allowed(action, {})).toEqual(sorted(ON_FACILITY_OBJECT[action]))
  })

  it.each(ACTIONS)('%s gives nothing by owning alone where the owner has left the group', (action) => {
    const stranger = person({ personId: 'stranger' })
    expect(can(left, action, { groupId: OWN, ownerId: 'owner' })).toBe(can(stranger, action, { groupId: OWN, ownerId: 'owner' }))
  })
})

describe('what must never be seen', () => {
  it('a PI sees no invoice, account or run of another group', () => {
    for (const action of ['invoice:read', 'group:read', 'run:read', 'run:pay', 'dataset:read', 'sample:read'] as const) {
      expect(can(otherPi, action, { groupId: OWN, ownerId: 'owner' })).toBe(false)
    }
  })

  it('an operator sees no money', () => {
    for (const action of ['invoice:read', 'group:read', 'run:pay', 'invoice:issue'] as const) expect(can(operator, action, { groupId: OWN })).toBe(false)
  })

  it('a person is themself only: sessions of another are not theirs, not even a manager’s to end as their own', () => {
    expect(can(owner, 'session:own', { ownerId: 'owner' })).toBe(true)
    expect(can(member, 'session:own', { ownerId: 'owner' })).toBe(false)
    expect(can(manager, 'session:own', { ownerId: 'owner' })).toBe(false)
  })

  it('an object without an owner belongs to nobody', () => {
    expect(can(person({ personId: '' }), 'session:own', {})).toBe(false)
  })
})

describe('people with several roles', () => {
  it('have each right where it holds: PI of one group, member of another', () => {
    const both = person({ memberships: [{ groupId: OTHER, role: 'pi' }, { groupId: OWN, role: 'member' }] })
    expect(can(both, 'invoice:read', { groupId: OTHER })).toBe(true)
    expect(can(both, 'invoice:read', { groupId: OWN })).toBe(false)
    expect(can(both, 'run:ask', { groupId: OWN })).toBe(true)
  })

  it('keep their facility role beside their group', () => {
    const operatorAndMember = person({ isOperator: true, memberships: [{ groupId: OWN, role: 'member' }] })
    expect(can(operatorAndMember, 'run:log', { groupId: OTHER })).toBe(true)
    expect(can(operatorAndMember, 'run:pay', { groupId: OWN })).toBe(true)
    expect(can(operatorAndMember, 'run:pay', { groupId: OTHER })).toBe(false)
  })

  it('work for the facility as managers or operators only', () => {
    expect(EVERYBODY.filter(who => hasFacilityRole(actors[who]))).toEqual(['manager', 'operator'])
  })
})
