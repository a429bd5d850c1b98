import { describe, expect, test } from 'vitest';
import { structuralNetwork } from '@stillroom/kernel/network';
import { conservationLaws, conservative } from '@stillroom/kernel/structure';
import { extremeRays } from '../../../packages/kernel/src/structure/extreme-rays.ts';
import { buildNetwork } from '../../support/network.ts';

const of = (text: string) => {
  const network = structuralNetwork(buildNetwork(text));
  const laws = conservationLaws(network)!;
  const text_ = ({ indices, values }: (typeof laws.basis)[number]) =>
    Array.from(indices, (i, k) => `${values[k]} ${network.species[i]}`).join(' + ');
  return {
    basis: laws.basis.map(text_),
    nonnegative: laws.nonnegative.map(text_),
    laws,
    conservative: conservative(laws, network.species.length),
  };
};

describe('conservation laws', () => {
  test('extreme non-negative laws come first, then enough others', () => {
    // A + B <=> C + D conserves A + C, A + D, B + C, B + D: four extreme laws, three of them independent.
    const found = of('A + B <=> C + D');
    expect(found.nonnegative).toEqual(['1 A + 1 C', '1 A + 1 D', '1 B + 1 C', '1 B + 1 D']);
    expect(found.basis).toEqual(['1 A + 1 C', '1 A + 1 D', '1 B + 1 C']);
    // 0 <=> A + B conserves A - B only.
    const signed = of('0 <=> A + B');
    expect(signed.nonnegative).toEqual([]);
    expect(signed.basis).toEqual(['1 A + -1 B']);
    expect(signed.conservative.holds).toBe(false);
  });

  test('a law of every species makes a network conservative, one left out does not', () => {
    expect(of('2 A <=> B').conservative).toEqual({
      holds: true,
      law: { indices: Int32Array.of(0, 1), values: [1n, 2n] },
    });
    const open = of('A <=> B; C -> 0');
    expect(open.conservative).toEqual({ holds: false, outside: 2 });
    expect(open.nonnegative).toEqual(['1 A + 1 B']);
  });

  test('the enumeration ends at its limits and says so', () => {
    // 2^n extreme rays: x_1 + x_2 = x_3 + x_4 chained.
    const inequalities = Array.from({ length: 12 }, (_, i) => [
      [2 * i, 1n] as const,
      [2 * i + 1, 1n] as const,
      [24, -1n] as const,
    ]);
    expect(extremeRays(25, inequalities, { rays: 50, steps: 1_000_000 }).rays).toBeNull();
    expect(extremeRays(25, inequalities, { rays: 1_000_000, steps: 1000 }).rays).toBeNull();
    expect(extremeRays(25, inequalities, { rays: 10_000, steps: 1e9 }).rays).toHaveLength(24 + 2 ** 12);
  });

  test('an undecided enumeration leaves conservativity to an exact linear programme', () => {
    const found = of('A + B <=> C + D; C -> F; D + F <=> G');
    const cut = { ...found.laws, nonnegative: [], nonnegativeComplete: false };
    const decided = conservative(cut, 6);
    expect(decided.holds).toBe(found.conservative.holds);
    const open = of('A + B <=> C; 0 <=> D + F; D + A <=> G');
    expect(conservative({ ...open.laws, nonnegative: [], nonnegativeComplete: false }, 6)).toMatchObject({
      holds: false,
    });
    expect(open.conservative.holds).toBe(false);
  });
});
