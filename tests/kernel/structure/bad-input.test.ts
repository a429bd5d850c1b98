import { describe, expect, test } from 'vitest';
import { structuralNetwork } from '@stillroom/kernel/network';
import type { Structure } from '@stillroom/kernel/structure';
import { analyse } from '@stillroom/kernel/structure';
import { buildNetwork } from '../../support/network.ts';

const of = (text: string): Structure => analyse(structuralNetwork(buildNetwork(text)));

const figures = ({ network, linkage, rank, deficiency, conservative, consistent }: Structure) => ({
  complexes: network.complexes.count,
  arrows: network.arrows.count,
  linkageClasses: linkage.count,
  rank,
  deficiency,
  conservative: conservative.holds,
  consistent,
});

describe('structure of networks that are hard on programs', () => {
  test('an empty network', () => {
    const structure = of('');
    expect(figures(structure)).toEqual({
      complexes: 0,
      arrows: 0,
      linkageClasses: 0,
      rank: 0,
      deficiency: 0,
      conservative: true,
      consistent: true,
    });
    expect(structure.siphons).toEqual({ siphons: [], complete: true });
    expect(structure.weaklyReversible).toBe(true);
  });

  test('a species that never reacts is a law and a siphon of its own', () => {
    const network = { ...buildNetwork('A <=> B'), species: ['A', 'B', 'Q'] };
    const structure = analyse(structuralNetwork(network));
    expect(structure.laws?.basis.map(({ indices }) => [...indices])).toEqual([[0, 1], [2]]);
    expect(structure.conservative.holds).toBe(true);
    expect(structure.siphons.siphons.map(({ species, critical }) => [[...species], critical])).toEqual([
      [[0, 1], false],
      [[2], false],
    ]);
  });

  test('the zero complex alone, and inflow without outflow', () => {
    expect(figures(of('0 -> A'))).toMatchObject({
      complexes: 2,
      rank: 1,
      deficiency: 0,
      conservative: false,
      consistent: false,
    });
    expect(figures(of('0 <=> A'))).toMatchObject({ rank: 1, consistent: true });
    expect(of('0 <=> A').siphons.siphons).toEqual([]);
  });

  test('duplicate rows and reactions that cancel', () => {
    expect(figures(of('A -> B; A -> B; B -> A; A -> B'))).toMatchObject({
      arrows: 2,
      rank: 1,
      deficiency: 0,
    });
    // A + E -> B + E and A -> B change the same.
    expect(figures(of('A + E -> B + E; B + F -> A + F'))).toMatchObject({ rank: 1, deficiency: 1 });
  });

  test('coefficients of 10^6', () => {
    const structure = of('1000000 A -> 999999 B; B + 1000000 C -> A');
    expect(structure.rank).toBe(2);
    const law = structure.laws!.basis[0]!;
    expect(law.values).toEqual([999999000000n, 1000000000000n, -1n]);
  });

  test.each([4194301, 4194287, 4194277, 4194271, 2147483647, 4294967291])(
    'A -> %i + 1 times A has rank 1',
    (p) => {
      const structure = of(`A -> ${p + 1} A`);
      expect(structure.rank).toBe(1);
      expect(structure.deficiency).toBe(0);
      expect(structure.laws?.basis).toEqual([]);
      expect(of(`A -> ${p + 1} A; B -> ${p + 1} C; B + C -> A`).rank).toBe(3);
    },
  );

  test('the coefficient of the issue: A -> 2147483648 A', () => {
    expect(of('A -> 2147483648 A').rank).toBe(1);
  });

  test('ten thousand linkage classes', () => {
    const rows = Array.from({ length: 10_000 }, (_, i) => `A${i} <=> B${i}`);
    const structure = analyse(structuralNetwork(pairs(rows.length)));
    expect(structure.linkage.count).toBe(rows.length);
    expect(structure.rank).toBe(rows.length);
    expect(structure.deficiency).toBe(0);
    expect(structure.laws?.basis).toHaveLength(rows.length);
    expect(structure.conservative.holds).toBe(true);
    expect(structure.siphons.siphons).toHaveLength(rows.length);
    expect(structure.siphons.complete).toBe(true);
  });

  test('a chain of ten thousand complexes', () => {
    const network = structuralNetwork(chain(10_000));
    const structure = analyse(network);
    expect(structure.strong.count).toBe(10_000);
    expect(structure.terminalCount).toBe(1);
    expect(structure.rank).toBe(9_999);
    expect(structure.consistent).toBe(false);
  });
});

/** A_i <=> B_i, i < count, made directly: the small reader of the tests is quadratic. */
function pairs(count: number) {
  const base = buildNetwork('');
  const index = Int32Array.from({ length: 2 * count }, (_, i) => i);
  return {
    ...base,
    species: Array.from(index, (i) => `${i % 2 === 0 ? 'A' : 'B'}${i >> 1}`),
    complexes: singles(2 * count),
    reactions: table(
      Int32Array.from(index),
      index.map((i) => i ^ 1),
    ),
  };
}

/** S_0 -> S_1 -> … */
function chain(count: number) {
  const steps = Int32Array.from({ length: count - 1 }, (_, i) => i);
  return {
    ...buildNetwork(''),
    species: Array.from({ length: count }, (_, i) => `S${i}`),
    complexes: singles(count),
    reactions: table(
      steps,
      steps.map((i) => i + 1),
    ),
  };
}

function singles(count: number) {
  return {
    count,
    offsets: Int32Array.from({ length: count + 1 }, (_, i) => i),
    species: Int32Array.from({ length: count }, (_, i) => i),
    numerators: new Float64Array(count).fill(1),
    denominators: null,
  };
}

function table(from: Int32Array, to: Int32Array) {
  const none = new Int32Array(from.length).fill(-1);
  return {
    count: from.length,
    from,
    to,
    row: new Int32Array(from.length),
    constant: none,
    law: none,
    partner: none,
  };
}
