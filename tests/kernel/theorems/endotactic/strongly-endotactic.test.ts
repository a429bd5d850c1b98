import { contextOf } from '@stillroom/kernel/theorems';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { endotacticity } from '../../../../packages/kernel/src/theorems/endotactic/strongly-endotactic.ts';
import { stronglyEndotactic } from '../../../../packages/kernel/src/theorems/witness/endotactic-rule.ts';
import { plainNetwork } from '../../../../packages/kernel/src/theorems/witness/plain-network.ts';
import type { TheoremContext } from '../../../../packages/kernel/src/theorems/context.ts';
import { buildNetwork } from '../../../support/network.ts';

const side = fc
  .tuple(...['A', 'B', 'C'].map(() => fc.integer({ min: 0, max: 3 })))
  .map((amounts) => amounts.flatMap((n, i) => (n === 0 ? [] : [`${n} ${'ABC'[i]!}`])).join(' + ') || '0');
const row = fc
  .tuple(side, side, fc.boolean())
  .filter(([from, to]) => from !== to)
  .map(([from, to, both]) => `${from} ${both ? '<=>' : '->'} ${to}`);

/** Whether a direction breaks the definition of Gopalkrishnan, Miller, Shiu 2014, by evaluating it. */
function breaks(context: TheoremContext, direction: readonly bigint[]): boolean {
  const height = (complex: number): number =>
    context
      .terms(complex)
      .reduce((sum, { species, coefficient }) => sum + coefficient * Number(direction[species]!), 0);
  const gains = context.arrows.map(({ from, to }) => height(to) - height(from));
  const top = Math.max(...context.arrows.map(({ from }) => height(from)));
  const outer = gains.filter((_, arrow) => height(context.arrows[arrow]!.from) === top);
  return (
    outer.some((gain) => gain > 0) || (outer.every((gain) => gain === 0) && gains.some((gain) => gain !== 0))
  );
}

test('a "no" names a direction that breaks the definition, a "yes" agrees with the dual cones of the checker', () => {
  const met = { yes: 0, no: 0, open: 0 };
  fc.assert(
    fc.property(fc.uniqueArray(row, { minLength: 1, maxLength: 6 }), (rows) => {
      const network = buildNetwork(rows.join('; '));
      const context = contextOf(network);
      const answer = endotacticity(context);
      met[answer.kind]++;
      if (answer.kind === 'no') expect(breaks(context, answer.direction)).toBe(true);
      const hypothesis = { claim: 'strongly endotactic', text: '', holds: true } as const;
      const verdict = context.verdict('global-stability');
      const finding = stronglyEndotactic({
        network,
        plain: plainNetwork(network),
        verdict,
        hypothesis,
        holds: true,
        witness: undefined,
      });
      expect(finding === null).toBe(answer.kind === 'yes');
    }),
    { seed: 2014, numRuns: 250 },
  );
  expect(met.yes).toBeGreaterThan(10);
  expect(met.no).toBeGreaterThan(10);
  expect(met.open).toBe(0);
});
