import type { Verdict, Witness } from '@stillroom/shared/cells';
import { checkWitness, contextOf, judgeAll } from '@stillroom/kernel/theorems';
import { describe, expect, test } from 'vitest';
import { buildNetwork } from '../../support/network.ts';

const networks = [
  'E + S <=> ES; ES -> E + P',
  'A -> 2 A; A + B -> 2 B; B -> 0',
  '2 A <=> A + B',
  'A <=> 2 A; A + B <=> C; C <=> B',
  'S0+E<=>ES0;ES0->S1+E;S1+F<=>FS1;FS1->S0+F',
  'A + B -> 2 B; B -> A',
  'X -> 2 X; X -> 0',
];

/** The witness with one number, index or name changed, in every way that matters. */
function spoilt(witness: Witness): Witness[] {
  switch (witness.kind) {
    case 'number':
      return [{ ...witness, left: Number(witness.left) + 1 }];
    case 'arrow':
      return [{ ...witness, reaction: witness.reaction + 1000 }];
    case 'vector': {
      const [key] = Object.keys(witness.entries);
      const changed = { ...witness.entries, [key!]: -Number(witness.entries[key!]) };
      return [
        { ...witness, entries: changed },
        { ...witness, entries: {} },
      ];
    }
    case 'set':
      return [];
    case 'minors':
      return witness.pairs.length === 0
        ? []
        : [{ ...witness, pairs: [{ ...witness.pairs[0]!, reactant: 12345 }] }];
    case 'states': {
      const [box] = witness.boxes;
      const shifted = Object.fromEntries(
        Object.entries(box!).map(([name, [low, high]]) => [name, [low * 1.01, high * 1.01] as const]),
      );
      return [
        { ...witness, boxes: [box!, box!] },
        { ...witness, boxes: [shifted, ...witness.boxes.slice(1)] },
        { ...witness, boxes: [box!] },
        {
          ...witness,
          totals: witness.totals.map(({ law, value }) => ({ law, value: `${Number(value) * 2}` })),
        },
      ];
    }
  }
}

describe('the checker of witnesses', () => {
  test.each(networks)('confirms every verdict on %s', (text) => {
    const network = buildNetwork(text);
    for (const verdict of judgeAll(network))
      expect([verdict.id, checkWitness(network, verdict).why]).toEqual([
        verdict.id,
        'Every hypothesis was confirmed from its witness.',
      ]);
  });

  test.each(networks)('rejects every spoilt witness on %s', (text) => {
    const network = buildNetwork(text);
    for (const verdict of judgeAll(network)) {
      verdict.hypotheses.forEach((hypothesis, k) => {
        if (hypothesis.holds === null || hypothesis.witness === undefined) return;
        for (const witness of spoilt(hypothesis.witness)) {
          // Without a conservation law there is no total to spoil.
          if (JSON.stringify(witness) === JSON.stringify(hypothesis.witness)) continue;
          const hypotheses = verdict.hypotheses.map((other, i) => (i === k ? { ...other, witness } : other));
          expect([
            verdict.id,
            hypothesis.claim,
            checkWitness(network, { ...verdict, hypotheses }).ok,
          ]).toEqual([verdict.id, hypothesis.claim, false]);
        }
      });
    }
  });

  test('rejects an answer that does not follow from its hypotheses', () => {
    const network = buildNetwork('A -> 2 A; A + B -> 2 B; B -> 0');
    const verdict = contextOf(network).verdict('deficiency-zero');
    expect(checkWitness(network, { ...verdict, applies: 'yes' }).ok).toBe(false);
    const turned: Verdict = {
      ...verdict,
      hypotheses: verdict.hypotheses.map((hypothesis) => ({ ...hypothesis, holds: true })),
      applies: 'yes',
    };
    expect(checkWitness(network, turned).ok).toBe(false);
  });

  test('rejects sets of species and of complexes that do not fit', () => {
    const network = buildNetwork('2 A <=> A + B');
    const verdict = contextOf(network).verdict('persistence');
    const hypotheses = verdict.hypotheses.map((hypothesis) =>
      hypothesis.witness?.kind === 'set'
        ? { ...hypothesis, witness: { kind: 'set', species: ['B'] } as const }
        : hypothesis,
    );
    expect(checkWitness(network, { ...verdict, hypotheses }).ok).toBe(false);
  });
});
