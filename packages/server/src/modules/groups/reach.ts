import type { Membership } from '@stillroom/shared/roles';
import { withArticle } from './membership.ts';

/** How far a role reaches: "an author", "a reader of 2 notebooks". */
export function reachInWords({ role, notebooks }: Membership): string {
  const words = withArticle(role);
  if (notebooks === null) return words;
  return `${words} of ${notebooks.length} notebook${notebooks.length === 1 ? '' : 's'}`;
}
