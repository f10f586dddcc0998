import { ForbiddenError } from '../errors';
import { ACTIONS, may, type Action, type Actor } from './policies';

/** @throws ForbiddenError where the actor's role may not do this. */
export function authorize(actor: Actor, action: Action): void {
  if (!may(actor.role, action)) throw new ForbiddenError(`As ${actor.role} of this cellar you cannot ${ACTIONS[action].says}.`);
}
