import { describe, expect, it } from 'vitest'
import { type AccessObject, type Action, ACTIONS, type Actor, can, GRANTS, hasFacilityRole } from '#shared/access/rules'

const actor = (personId: string, more: Partial<Actor> = {}): Actor => ({ personId, isManager: false, isOperator: false, memberships: [], ...more })
const ALDER = 'alder'
const CEDAR = 'cedar'
const manager = actor('manager', { isManager: true })
const operator = actor('operator', { isOperator: true })
const pi = actor('pi', { memberships: [{ groupId: ALDER, role: 'pi' }] })
const member = actor('member', { memberships: [{ groupId: ALDER, role: 'member' }] })
const guest = actor('guest')

/** Who does it to what: the columns of the table below, in order. */
const CASES: readonly [string, Actor, AccessObject][] = [
  ['a manager', manager, { groupId: ALDER, ownerId: 'somebody' }],
  ['an operator', operator, { groupId: ALDER, ownerId: 'somebody' }],
  ['a PI in their group', pi, { groupId: ALDER, ownerId: 'somebody' }],
  ['a PI in another group', pi, { groupId: CEDAR, ownerId: 'somebody' }],
  ['a member with their own in their group', member, { groupId: ALDER, ownerId: 'member' }],
  ['a member with another\'s in their group', member, { groupId: ALDER, ownerId: 'somebody' }],
  ['a member in another group', member, { groupId: CEDAR, ownerId: 'somebody' }],
  ['somebody of no group', guest, { groupId: ALDER, ownerId: 'somebody' }],
]

/**
 * Who may do what, from the roles of product.md (visiting user, PI, operator, manager).
 * Columns: manager, operator, PI own group, PI other group, member own, member another's, member other group, of no group.
 */
const EXPECTED: Readonly<Record<Action, string>> = {
  //                        M O P p m g o n
  'board:read': /*        */'+ + + + + + + +',
  'closure:read': /*      */'+ + + + + + + +',
  'closure:write': /*     */'+ - - - - - - -',
  'cryostat:read': /*     */'+ + + + + + + +',
  'run:ask': /*           */'+ - + - + + - -',
  'run:read': /*          */'+ + + - + + - -',
  'run:withdraw': /*      */'+ - + - + - - -',
  'run:approve': /*       */'+ - - - - - - -',
  'run:decline': /*       */'+ - - - - - - -',
  'run:pay': /*           */'- - + - + + - -',
  'run:log': /*           */'+ + - - - - - -',
  'run:advance': /*       */'+ + - - - - - -',
  'run:finish': /*        */'+ + - - - - - -',
  'sample:read': /*       */'+ + + - + + - -',
  'sample:write': /*      */'+ - + - + + - -',
  'dataset:read': /*      */'+ + + - + + - -',
  'dataset:upload': /*    */'+ + + - + + - -',
  'analysis:read': /*     */'+ + + - + + - -',
  'analysis:write': /*    */'+ + + - + + - -',
  'analysis:sign': /*     */'+ - + - - - - -',
  'analysis:comment': /*  */'+ + + - + + - -',
  'heat-capacity:check': /**/'+ + + + + + + +',
  'invoice:read': /*      */'+ - + - - - - -',
  'invoice:issue': /*     */'+ - - - - - - -',
  'rates:read': /*        */'+ + + + + + + +',
  'rates:write': /*       */'+ - - - - - - -',
  'helium:read': /*       */'+ + - - - - - -',
  'helium:write': /*      */'+ + - - - - - -',
  'group:read': /*        */'+ - + - - - - -',
  'group:write': /*       */'+ - - - - - - -',
  'people:read': /*       */'+ - - - - - - -',
  'people:write': /*      */'+ - - - - - - -',
  'desk:read': /*         */'+ - - - - - - -',
  'today:read': /*        */'+ + - - - - - -',
  'session:own': /*       */'- - - - + - - -',
}

describe('the table of rights', () => {
  it('is written out here for every action, and for none else', () => {
    expect(Object.keys(EXPECTED).sort()).toEqual([...ACTIONS].sort())
    expect(Object.keys(GRANTS).sort()).toEqual([...ACTIONS].sort())
  })

  const rows = ACTIONS.flatMap(action => CASES.map(([who, by, object], column) => ({ action, who, by, object, allowed: EXPECTED[action].split(' ')[column] === '+' })))
  it.each(rows)('$action by $who: $allowed', ({ action, by, object, allowed }) => {
    expect(can(by, action, object)).toBe(allowed)
  })
})

describe('rights that matter most', () => {
  it('a PI reads the invoices of their own group only', () => {
    expect(can(pi, 'invoice:read', { groupId: ALDER })).toBe(true)
    expect(can(pi, 'invoice:read', { groupId: CEDAR })).toBe(false)
    expect(can(pi, 'invoice:read')).toBe(false)
  })

  it('an operator neither approves nor sees invoices', () => {
    for (const action of ['run:approve', 'run:decline', 'invoice:read', 'invoice:issue'] as const) expect(can(operator, action, { groupId: ALDER })).toBe(false)
  })

  it('a visiting user does not write the run sheet, not even of their own run', () => {
    for (const action of ['run:log', 'run:advance', 'run:finish'] as const) expect(can(member, action, { groupId: ALDER, ownerId: 'member' })).toBe(false)
  })

  it('a role in one group is no role in another', () => {
    const both = actor('both', { memberships: [{ groupId: ALDER, role: 'pi' }, { groupId: CEDAR, role: 'member' }] })
    expect(can(both, 'group:read', { groupId: ALDER })).toBe(true)
    expect(can(both, 'group:read', { groupId: CEDAR })).toBe(false)
    expect(can(both, 'run:read', { groupId: CEDAR })).toBe(true)
  })

  it('who has left a group has no right to what they asked for in it', () => {
    const left = actor('left')
    expect(can(left, 'run:withdraw', { groupId: ALDER, ownerId: 'left' })).toBe(false)
    expect(can(left, 'run:read', { groupId: ALDER, ownerId: 'left' })).toBe(false)
  })

  it('a session is its owner\'s alone', () => {
    expect(can(guest, 'session:own', { ownerId: 'guest' })).toBe(true)
    expect(can(manager, 'session:own', { ownerId: 'guest' })).toBe(false)
    expect(can(guest, 'session:own')).toBe(false)
  })

  it('an operator who is also a PI keeps the rights of both', () => {
    const two = actor('two', { isOperator: true, memberships: [{ groupId: ALDER, role: 'pi' }] })
    expect(can(two, 'run:log', { groupId: CEDAR })).toBe(true)
    expect(can(two, 'invoice:read', { groupId: ALDER })).toBe(true)
    expect(can(two, 'invoice:read', { groupId: CEDAR })).toBe(false)
  })
})

describe('a role of the facility', () => {
  it('is the manager\'s and the operator\'s', () => {
    expect([manager, operator, pi, member, guest].map(hasFacilityRole)).toEqual([true, true, false, false, false])
  })
})
