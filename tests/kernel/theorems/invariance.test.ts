import fc from 'fast-check';
import type { Verdict } from '@stillroom/shared/cells';
import { checkWitness, contextOf, judgeAll } from '@stillroom/kernel/theorems';
import { expect, test } from 'vitest';
import { searchPair } from '../../../packages/kernel/src/theorems/steady-states/search-pair.ts';
import { buildNetwork } from '../../support/network.ts';

/** Rows as lists of [species, coefficient] on both sides. */
type Side = readonly (readonly [number, number])[];
interface Row {
  readonly from: Side;
  readonly to: Side;
  readonly reversible: boolean;
}

const side = fc.uniqueArray(fc.tuple(fc.integer({ min: 0, max: 3 }), fc.integer({ min: 1, max: 2 })), {
  maxLength: 2,
  selector: ([species]) => species,
});
const row = fc.record({ from: side, to: side, reversible: fc.boolean() });
const keyOf = (terms: Side): string => [...terms].sort(([a], [b]) => a - b).join(';');
const rows = fc
  .array(row, { minLength: 1, maxLength: 5 })
  .map((list) => list.filter(({ from, to }) => keyOf(from) !== keyOf(to)))
  .filter((list) => list.length > 0);

function written(list: readonly Row[], names: readonly string[]): string {
  const one = (terms: Side): string =>
    terms.length === 0 ? '0' : terms.map(([i, c]) => `${c} ${names[i]!}`).join(' + ');
  return list
    .map(({ from, to, reversible }) => `${one(from)} ${reversible ? '<=>' : '->'} ${one(to)}`)
    .join('; ');
}

/** What of a verdict may not depend on names and order. */
function essence(verdicts: readonly Verdict[]): string[] {
  return verdicts.map(
    ({ id, applies, case: part }) =>
      `${id}: ${applies}${applies === 'yes' && part !== undefined ? `, ${part}` : ''}`,
  );
}

test('renaming species and permuting rows changes no verdict, and every witness holds', () => {
  fc.assert(
    fc.property(rows, fc.integer({ min: 0, max: 23 }), (list, turn) => {
      const names = ['A', 'B', 'C', 'D'];
      const network = buildNetwork(written(list, names));
      const verdicts = judgeAll(network);
      for (const verdict of verdicts)
        expect([verdict.id, checkWitness(network, verdict)]).toEqual([
          verdict.id,
          { ok: true, confirmed: true, why: expect.any(String) as string },
        ]);
      const permuted = [...list.slice(turn % list.length), ...list.slice(0, turn % list.length)].reverse();
      const renamed = judgeAll(buildNetwork(written(permuted, ['Q', 'M', 'Z', 'B'])));
      expect(essence(renamed)).toEqual(essence(verdicts));
    }),
    { seed: 20251201, numRuns: 120 },
  );
});

test('what is proven does not contradict itself', () => {
  fc.assert(
    fc.property(rows, (list) => {
      const verdicts = new Map(
        judgeAll(buildNetwork(written(list, ['A', 'B', 'C', 'D']))).map(({ id, applies }) => [id, applies]),
      );
      const yes = (id: string): boolean => verdicts.get(id as never) === 'yes';
      // A concordant network is injective for mass action; a unique state cannot be several; persistence needs no critical siphon.
      if (yes('concordant')) expect(verdicts.get('injective')).toBe('yes');
      if (yes('at-most-one')) expect(verdicts.get('several-steady-states')).toBe('no');
      if (yes('several-steady-states'))
        expect(yes('injective') || yes('deficiency-one') || yes('deficiency-zero')).toBe(false);
      if (yes('persistence')) expect(verdicts.get('no-boundary-steady-state')).toBe('yes');
      if (yes('existence')) expect(verdicts.get('no-positive-steady-state')).toBe('no');
      if (yes('detailed-balance')) expect(verdicts.get('complex-balance')).toBe('yes');
      if (yes('robust-extinction')) expect(yes('deficiency-zero')).toBe(false);
    }),
    { seed: 7, numRuns: 150 },
  );
});

test('where a theorem excludes several steady states, no search with verified boxes finds two', () => {
  fc.assert(
    fc.property(rows, (list) => {
      const text = written(list, ['A', 'B', 'C', 'D']);
      const context = contextOf(buildNetwork(text));
      if (context.verdict('at-most-one').applies === 'yes')
        expect([text, searchPair(context)]).toEqual([text, null]);
    }),
    { seed: 42, numRuns: 80 },
  );
});
