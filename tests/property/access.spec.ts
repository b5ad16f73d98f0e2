import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { type Action, ACTIONS, type Actor, can } from '#shared/access/rules'

const groupId = fc.constantFrom('alder', 'birch', 'cedar', 'hazel')
const personId = fc.constantFrom('ada', 'ben', 'cleo')
const memberships = fc.uniqueArray(fc.record({ groupId, role: fc.constantFrom('member' as const, 'pi' as const) }), { selector: ({ groupId }) => groupId })
const actor: fc.Arbitrary<Actor> = fc.record({ personId, isManager: fc.boolean(), isOperator: fc.boolean(), memberships })
const object = fc.record({ groupId, ownerId: personId }, { requiredKeys: [] })
const action = fc.constantFrom(...ACTIONS)

/** What anybody who is signed in may see, whoever's it is (product.md: board, closures, cryostats, rates, the open check). */
const OPEN: readonly Action[] = ['board:read', 'closure:read', 'cryostat:read', 'rates:read', 'heat-capacity:check']

describe('rights', () => {
  it('stop at the border of a group for whoever has no role in the facility', () => {
    fc.assert(fc.property(actor, object, action, (by, target, what) => {
      const outsider = { ...by, isManager: false, isOperator: false, memberships: by.memberships.filter(membership => membership.groupId !== target.groupId) }
      // What belongs to a person and to no group is that person's.
      const owns = target.groupId === undefined && target.ownerId === by.personId && ['session:own', 'run:withdraw'].includes(what)
      expect(can(outsider, what, target)).toBe(OPEN.includes(what) || owns)
    }), { numRuns: 1000 })
  })

  it('are never lost by a further role', () => {
    fc.assert(fc.property(actor, object, action, groupId, (by, target, what, further) => {
      if (!can(by, what, target)) return
      const asPi = { ...by, memberships: [...by.memberships.filter(membership => membership.groupId !== further), { groupId: further, role: 'pi' as const }] }
      for (const more of [{ ...by, isManager: true }, { ...by, isOperator: true }, asPi]) expect(can(more, what, target)).toBe(true)
    }), { numRuns: 1000 })
  })

  it('to write are never wider than the right to read the same kind of thing in one\'s group', () => {
    fc.assert(fc.property(actor, groupId, personId, action, (by, group, ownerId, what) => {
      const target = { groupId: group, ownerId }
      const read = ACTIONS.find(other => other === `${what.split(':')[0]}:read`)
      if (read && can(by, what, target)) expect(can(by, read, target)).toBe(true)
    }), { numRuns: 1000 })
  })

  it('do not depend on the order of the memberships', () => {
    fc.assert(fc.property(actor, object, action, (by, target, what) => {
      expect(can({ ...by, memberships: [...by.memberships].reverse() }, what, target)).toBe(can(by, what, target))
    }))
  })
})
