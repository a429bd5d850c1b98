import type { Me } from '@stillroom/shared/contracts';
import type { Request } from 'express';
import { signedOut } from '../errors.ts';

/** The person signed in, as read with the session of this very request. */
export type SignedIn = Me;

/** Who may come to a route at all; what they may do there is decided by the role table after loading. */
export type Who = 'anyone' | 'person';

/** The person whom passport found in the session; its own type knows nothing of ours. */
export const personOf = (request: Request): SignedIn | null => (request.user as SignedIn | undefined) ?? null;

/** @throws signed-out */
export function authenticate(request: Request, who: Who): SignedIn | null {
  const person = personOf(request);
  if (who === 'anyone') return person;
  if (person === null) throw signedOut();
  return person;
}
