import type { Verdict, Witness } from '@stillroom/shared/cells';
import type { Network } from '@stillroom/shared/network';
import { checkWitness, contextOf, judgeAll } from '@stillroom/kernel/theorems';
import { describe, expect, test } from 'vitest';
import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import type { NetworkOptions } from '../../../support/network.ts';
import { buildNetwork } from '../../../support/network.ts';
import { referenceNetwork, referenceNetworks } from '../../../support/reference-networks.ts';

const networks = [
  'E + S <=> ES; ES -> E + P',
  'A -> 2 A; A + B -> 2 B; B -> 0',
  '2 A <=> A + B',
  'A <=> 2 A; A + B <=> C; C <=> B',
  'S0+E<=>ES0;ES0->S1+E;S1+F<=>FS1;FS1->S0+F',
  'A + B -> 2 B; B -> A',
  'X -> 2 X; X -> 0',
  'Y -> X; X + Y -> 0; X -> 2 X + 2 Z; 2 X -> 0; Z -> Y',
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

/** The first hypothesis of each verdict that was not confirmed afresh. */
function unconfirmed(text: string, options: NetworkOptions = {}): string[] {
  return unconfirmedOn(buildNetwork(text, options));
}

function unconfirmedOn(network: Network): string[] {
  return judgeAll(network).flatMap((verdict) => {
    const { confirmed, why } = checkWitness(network, verdict);
    return confirmed ? [] : [`${verdict.id} (${verdict.applies}): ${why}`];
  });
}

describe('every yes and no is confirmed from its own evidence', () => {
  test.each(referenceNetworks.map((entry) => [entry.id, entry] as const))('%s', (_, entry) => {
    expect(unconfirmedOn(referenceNetwork(entry))).toEqual([]);
  });

  const cases = (
    JSON.parse(readFileSync(new URL('../../../reference/verdicts.json', import.meta.url), 'utf8')) as {
      networks: { id: string; text: string }[];
    }
  ).networks;

  test.each(cases)('$id, without values and with all constants and starts 1', ({ text }) => {
    expect(unconfirmed(text)).toEqual([]);
    const { species, reactions } = buildNetwork(text);
    const constants = Array.from({ length: reactions.count }, () => 1);
    const start = Object.fromEntries(species.map((name) => [name, 1]));
    expect(unconfirmed(text, { constants, start })).toEqual([]);
  });

  test('random networks of up to six species, half of them with values (fixed seed)', () => {
    const complex = fc
      .array(fc.integer({ min: 0, max: 5 }), { maxLength: 3 })
      .map((list) => [...list].sort().map((i) => 'ABCDEF'[i]!));
    const row = fc
      .tuple(complex, complex, fc.boolean())
      .filter(([from, to]) => from.join() !== to.join())
      .map(([from, to, both]) => `${side(from)} ${both ? '<=>' : '->'} ${side(to)}`);
    const values = fc.record({
      constants: fc.array(fc.constantFrom(1, 2, 3, '1/2'), { minLength: 14, maxLength: 14 }),
      amounts: fc.array(fc.integer({ min: 0, max: 3 }), { minLength: 6, maxLength: 6 }),
    });
    fc.assert(
      fc.property(fc.uniqueArray(row, { minLength: 1, maxLength: 7 }), fc.option(values), (rows, given) => {
        const text = rows.join('; ');
        const start = Object.fromEntries(
          buildNetwork(text).species.map((name) => [name, given?.amounts['ABCDEF'.indexOf(name)] ?? 0]),
        );
        const options = given === null ? {} : { constants: given.constants, start };
        expect(unconfirmed(text, options)).toEqual([]);
      }),
      { seed: 20261201, numRuns: 120 },
    );
  });
});

function side(names: readonly string[]): string {
  const count = new Map<string, number>();
  for (const name of names) count.set(name, (count.get(name) ?? 0) + 1);
  return [...count].map(([name, times]) => `${times} ${name}`).join(' + ') || '0';
}
