/** What can be done; the part before the colon names the kind of object, and its `read` decides whether it may be seen at all. */
export const ACTIONS = [
  'board:read', 'closure:read', 'closure:write', 'cryostat:read', 'run:ask', 'run:read', 'run:withdraw', 'run:approve', 'run:decline', 'run:pay',
  'run:log', 'run:advance', 'run:finish', 'sample:read', 'sample:write', 'dataset:read', 'dataset:upload', 'analysis:read', 'analysis:write',
  'analysis:sign', 'analysis:comment', 'heat-capacity:check', 'invoice:read', 'invoice:issue', 'rates:read', 'rates:write', 'helium:read',
  'helium:write', 'group:read', 'group:write', 'people:read', 'people:write', 'desk:read', 'today:read', 'session:own',
] as const

/** One thing that can be done. */
export type Action = (typeof ACTIONS)[number]

/** Who acts, with the rights they have at this moment. */
export interface Actor {
  readonly personId: string
  readonly isManager: boolean
  readonly isOperator: boolean
  readonly memberships: readonly { readonly groupId: string, readonly role: 'member' | 'pi' }[]
}

/** Whose the object is; an empty one belongs to the facility. */
export interface AccessObject {
  readonly groupId?: string
  readonly ownerId?: string
}

/** Who may do a thing: facility roles, members or PIs of the object's group, its owner, or anyone signed in. */
type Grant = 'manager' | 'operator' | 'member' | 'pi' | 'owner' | 'anyone'

const OWN_GROUP_AND_FACILITY: readonly Grant[] = ['manager', 'operator', 'member', 'pi']

/** The whole of the rights: action × who. A member's grant holds for objects of their own group only. */
export const GRANTS: Readonly<Record<Action, readonly Grant[]>> = {
  'board:read': ['anyone'],
  'closure:read': ['anyone'],
  'closure:write': ['manager'],
  'cryostat:read': ['anyone'],
  'run:ask': ['manager', 'member', 'pi'],
  'run:read': OWN_GROUP_AND_FACILITY,
  'run:withdraw': ['manager', 'pi', 'owner'],
  'run:approve': ['manager'],
  'run:decline': ['manager'],
  'run:pay': ['member', 'pi'],
  'run:log': ['manager', 'operator'],
  'run:advance': ['manager', 'operator'],
  'run:finish': ['manager', 'operator'],
  'sample:read': OWN_GROUP_AND_FACILITY,
  'sample:write': ['manager', 'member', 'pi'],
  'dataset:read': OWN_GROUP_AND_FACILITY,
  'dataset:upload': OWN_GROUP_AND_FACILITY,
  'analysis:read': OWN_GROUP_AND_FACILITY,
  'analysis:write': OWN_GROUP_AND_FACILITY,
  'analysis:sign': ['manager', 'pi'],
  'analysis:comment': OWN_GROUP_AND_FACILITY,
  'heat-capacity:check': ['anyone'],
  'invoice:read': ['manager', 'pi'],
  'invoice:issue': ['manager'],
  'rates:read': ['anyone'],
  'rates:write': ['manager'],
  'helium:read': ['manager', 'operator'],
  'helium:write': ['manager', 'operator'],
  'group:read': ['manager', 'pi'],
  'group:write': ['manager'],
  'people:read': ['manager'],
  'people:write': ['manager'],
  'desk:read': ['manager'],
  'today:read': ['manager', 'operator'],
  'session:own': ['owner'],
}

/**
 * Whether an actor may do an action on an object.
 *
 * @param actor who acts
 * @param action what they want to do
 * @param object whose it is; without a group, grants to members do not apply
 */
export function can(actor: Actor, action: Action, object: AccessObject = {}): boolean {
  const membership = object.groupId === undefined ? undefined : actor.memberships.find(({ groupId }) => groupId === object.groupId)
  return GRANTS[action].some((grant) => {
    switch (grant) {
      case 'anyone': return true
      case 'manager': return actor.isManager
      case 'operator': return actor.isOperator
      case 'owner': return object.ownerId === actor.personId && (object.groupId === undefined || membership !== undefined)
      case 'pi': return membership?.role === 'pi'
      case 'member': return membership !== undefined
    }
  })
}

/** Whether the actor works for the facility and so sees every group's runs. */
export function hasFacilityRole(actor: Actor): boolean {
  return actor.isManager || actor.isOperator
}
