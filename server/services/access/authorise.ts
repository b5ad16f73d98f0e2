import { ACTIONS, can } from '#shared/access/rules'
import type { AccessObject, Action, Actor } from '#shared/access/rules'
import { DomainError } from '#shared/errors'

// Which actors had an object checked during their request; `defineApi` refuses a reply for one that had none.
const checked = new WeakSet<Actor>()

/**
 * Lets an action on an object pass or refuses it; the one place where rights are asked.
 *
 * @param actor who acts; one object a request
 * @param action what they want to do
 * @param object whose it is
 * @throws DomainError `not-found` for an object the actor may not even see, `not-allowed` for one they may see
 */
export function authorise(actor: Actor, action: Action, object: AccessObject = {}): void {
  checked.add(actor)
  if (can(actor, action, object)) return
  const read = ACTIONS.find(candidate => candidate === `${action.slice(0, action.indexOf(':'))}:read`)
  if (read && read !== action && can(actor, read, object)) {
    throw new DomainError('not-allowed', 'Your role does not allow this. Ask the facility\'s manager.')
  }
  throw new DomainError('not-found', 'There is nothing here, or it is not yours to see.')
}

/** Whether any object was checked for this actor. */
export function wasAuthorised(actor: Actor): boolean {
  return checked.has(actor)
}
