import type { Structure } from '../structure/index.ts';
import { LONGEST_SET } from './structure-lists.ts';

/** Sentences for people on what a structure leaves open or leaves out. */
export function structureNotes({ network, laws, siphons, consistent, conservative }: Structure): string[] {
  const notes = [...network.warnings];
  if (laws === null) {
    notes.push(
      'The rank is not stated: this network is too large for a proof. Counts and classes are those of all of it.',
    );
    return notes;
  }
  if (!laws.complete) {
    notes.push('Some conservation laws have coefficients too long to be written; their number is proven.');
  }
  if (!laws.nonnegativeComplete) {
    notes.push('Not all extreme non-negative conservation laws are listed: there are too many.');
  }
  if (laws.nonnegative.some(({ indices }) => indices.length > LONGEST_SET)) {
    notes.push(`Laws with more than ${LONGEST_SET} species are named by their first terms.`);
  }
  if (conservative.holds === null) {
    notes.push('Whether the network is conservative is undecided: it is too large for the exact test.');
  }
  if (consistent === null) {
    notes.push('Whether the network is consistent is undecided: it is too large for the exact test.');
  }
  if (siphons.siphons.some(({ critical }) => critical === null)) {
    notes.push(
      'Whether some of the minimal siphons are critical is undecided: they are too many or too large.',
    );
  }
  if (!siphons.complete) {
    notes.push('Not all minimal siphons are listed: the search was ended by its limit.');
  }
  if (siphons.siphons.some(({ species }) => species.length > LONGEST_SET)) {
    notes.push(`Minimal siphons with more than ${LONGEST_SET} species are left out of the list.`);
  }
  return notes;
}
