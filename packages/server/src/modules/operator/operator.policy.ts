import { type Ability, may } from '@stillroom/shared/roles';
import { forbidden } from '../../errors.ts';
import type { SignedIn } from '../../http/authenticate.ts';

/** @throws forbidden for whoever does not have the operator's standing. */
export function authorizeOperator(person: SignedIn, ability: Ability): void {
  if (may(person.operator ? 'operator' : null, ability)) return;
  throw forbidden('Only the operator of this installation may do that.');
}
