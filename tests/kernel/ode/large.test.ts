import { evaluateTrajectory } from '@stillroom/kernel/cells';
import { PreparationStopped } from '@stillroom/kernel/ode';
import { describe, expect, test } from 'vitest';
import { factorizeSymbolically } from '../../../packages/kernel/src/ode/linear/symbolic.ts';
import { odeSystem, rateEquations, resolveValues } from '@stillroom/kernel/rates';
import { networkOf, type PlainReaction } from '../../support/network-of.ts';

const hop = 3;

/** Hopping between neighbours on a torus, all at one site at first. */
function torus(side: number) {
  const reactions: PlainReaction[] = [];
  const site = (i: number, j: number): string => `X${i % side}_${j % side}`;
  for (let i = 0; i < side; i++) {
    for (let j = 0; j < side; j++) {
      for (const to of [site(i + 1, j), site(i, j + 1)]) {
        reactions.push({ from: { [site(i, j)]: 1 }, to: { [to]: 1 }, k: hop, kr: hop });
      }
    }
  }
  return networkOf({ reactions, initial: { X0_0: 1 } });
}

/** On a ring x_i(t) = (1/N) Σ_k exp(−2 h (1 − cos(2πk/N)) t) cos(2πki/N) (Fourier); on a torus the product of two. */
function exact(side: number, i: number, j: number, t: number): number {
  const onRing = (place: number): number => {
    let sum = 0;
    for (let k = 0; k < side; k++) {
      const angle = (2 * Math.PI * k) / side;
      sum += Math.exp(-2 * hop * (1 - Math.cos(angle)) * t) * Math.cos(angle * place);
    }
    return sum / side;
  };
  return onRing(i) * onRing(j);
}

function factorWork(side: number): number {
  const network = torus(side);
  return factorizeSymbolically(odeSystem(rateEquations(network, resolveValues(network, {}))).pattern).work;
}

test('a torus of 5 × 5 is factorised by an unrolled routine, one of 20 × 20 by tables', () => {
  expect(factorWork(5)).toBeLessThan(4000);
  expect(factorWork(20)).toBeGreaterThan(4000);
});

describe.each([5, 20])('diffusion on a torus of %d² sites', (side) => {
  test.each(['stiff', 'nonstiff'] as const)('agrees with the closed form (%s)', (method) => {
    const { species, conservationDrift, ended } = evaluateTrajectory(torus(side), {
      network: 'n',
      times: [0.3, 1],
      method,
      rtol: 1e-8,
      atol: 1e-11,
    });
    expect(ended).toBe('complete');
    expect(conservationDrift).toBeLessThan(1e-13);
    for (const [i, j] of [
      [0, 0],
      [0, 1],
      [2, 3],
      [side - 1, 1],
    ] as const) {
      [0.3, 1].forEach((t, n) => expect(species[`X${i}_${j}`]![n]).toBeCloseTo(exact(side, i, j, t), 8));
    }
  });
});

test('linear algebra driven by tables gives the same bits for either backend', () => {
  const settings = { network: 'n', until: 0.2, points: 3, method: 'stiff', rtol: 1e-3 } as const;
  const network = torus(20);
  expect(evaluateTrajectory(network, settings, { backend: 'interpreted' })).toEqual(
    evaluateTrajectory(network, settings, { backend: 'wasm' }),
  );
});

test('the preparation of a large system can be ended before the course begins', () => {
  let asked = 0;
  const settings = { network: 'n', until: 1 } as const;
  expect(() => evaluateTrajectory(torus(40), settings, { deadline: () => ++asked > 2 })).toThrow(
    PreparationStopped,
  );
  expect(asked).toBe(3);
});

test('the order of a large factorisation can be ended with the course so far', () => {
  let asked = 0;
  let begun = 0;
  const result = evaluateTrajectory(
    torus(40),
    { network: 'n', until: 1, method: 'stiff' },
    { deadline: () => begun > 0 && ++asked > 1, progress: () => begun++ },
  );
  expect(result.ended).toBe('stopped');
  expect(result.times).toEqual([0]);
  expect(result.statistics.steps).toBe(0);
});
