import { type Ability, may } from '@stillroom/shared/roles';
import { forbidden } from '../../errors.ts';

/** Whoever holds a link that opens stands there as its reviewer. @throws forbidden */
export function authorizeReviewer(ability: Ability): void {
  if (!may('reviewer', ability)) throw forbidden('A reviewer may not do that.');
}
