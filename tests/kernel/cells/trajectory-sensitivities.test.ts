import { evaluateTrajectory } from '@stillroom/kernel/cells';
import type { TrajectoryResult, TrajectorySettings } from '@stillroom/shared/cells';
import { readNetwork } from '@stillroom/shared/notation';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';

const tight = { rtol: 1e-10, atol: 1e-13 } as const;

function run(text: string, settings: Omit<TrajectorySettings, 'network'>): TrajectoryResult {
  const { network, complaints } = readNetwork(text);
  if (network === null) throw new Error(complaints.map(({ message }) => message).join(' '));
  return evaluateTrajectory(network, { network: 'n', ...tight, ...settings });
}

const methods = ['stiff', 'nonstiff', 'auto'] as const;

describe('sensitivities through events, by closed forms', () => {
  test.each(methods)('a dose whenever the level falls to c: A = dose · (A0/c)^m · e^(−kt) (%s)', (method) => {
    // Between doses A = d (A0/c) (d/c)^(m−1) e^(−kt): the time of every dose moves with k and c.
    const text = 'let c = 2, d = 7\nA -> 0 | k = 0.7\nstart A = 10\nevent when A < c: A = d\n';
    const { times, species, fired, sensitivities } = run(text, {
      until: 6,
      points: 13,
      method,
      sensitivities: true,
    });
    expect(fired!.length).toBeGreaterThan(1);
    times.forEach((t, i) => {
      const doses = fired!.filter(({ time }) => time <= t).length;
      const level = species['A']![i]!;
      expect(level).toBeCloseTo(10 * (7 / 2) ** doses * Math.exp(-0.7 * t), 6);
      expect(sensitivities!['k']!['A']![i]).toBeCloseTo(-t * level, 6);
      expect(sensitivities!['c']!['A']![i]).toBeCloseTo((-doses / 2) * level, 6);
      expect(sensitivities!['d']!['A']![i]).toBeCloseTo((doses / 7) * level, 6);
    });
  });

  test('a constant that an event sets no longer acts afterwards', () => {
    const { times, sensitivities } = run('A -> 0 | k = 0.7\nstart A = 10\nevent when t >= 2: k = 0.1\n', {
      until: 4,
      points: 9,
      sensitivities: true,
    });
    times.forEach((t, i) => {
      const level = 10 * Math.exp(-0.7 * Math.min(t, 2) - 0.1 * Math.max(0, t - 2));
      expect(sensitivities!['k']!['A']![i]).toBeCloseTo(-Math.min(t, 2) * level, 7);
    });
  });

  test('a constant set from others, and what is derived from it, move with them', () => {
    // From t = 1 on k = 2c and q = 3k, both by c.
    const text =
      'let c = 0.2, q = 3*k\nA -> 0 | k = 0.5\nB -> 0 | q\nstart A = 1, B = 1\nevent when t >= 1: k = 2*c\n';
    const { sensitivities } = run(text, { times: [0.5, 2], sensitivities: ['c', 'k'] });
    const [a, b] = [Math.exp(-0.5 - 0.4), Math.exp(-1.5 - 1.2)];
    expect(sensitivities!['c']!['A']![0]).toBe(0);
    expect(sensitivities!['c']!['A']![1]).toBeCloseTo(-2 * a, 8);
    expect(sensitivities!['c']!['B']![1]).toBeCloseTo(-6 * b, 8);
    expect(sensitivities!['k']!['A']![1]).toBeCloseTo(-1 * a, 8);
    expect(sensitivities!['k']!['B']![1]).toBeCloseTo(-3 * b, 8);
  });

  test('an event that sets a value by the time, at a time that moves', () => {
    // A = e^(−kt) reaches c at τ = ln(1/c)/k, when B = τ.
    const { sensitivities } = run(
      'let c = 0.5\nA -> 0 | k = 0.8\nB -> C | 0\nstart A = 1\nevent when A < c: B = t\n',
      { times: [2], sensitivities: ['k', 'c'] },
    );
    expect(sensitivities!['k']!['B']![0]).toBeCloseTo(-Math.LN2 / 0.64, 7);
    expect(sensitivities!['c']!['B']![0]).toBeCloseTo(-1 / (0.8 * 0.5), 7);
  });

  test.each([
    ['a condition that jumps', 'floor(t) >= 2', 2],
    ['two conditions that meet with different slopes', 'A >= 6 and B >= 4', 2],
  ])('end in words at %s', (_name, condition, time) => {
    const text = `let k = 1, q = 1\nrate A = 3*k, B = 2*q\nevent when ${condition}: A = 0\n`;
    const { ended, why, times } = run(text, { until: 3, sensitivities: ['k', 'q'] });
    expect(ended).toBe('stopped');
    expect(why).toContain('the sensitivities end there');
    expect(times.at(-1)).toBeCloseTo(time, 9);
  });
});

test('sensitivities through events agree with differences of courses', () => {
  const text = [
    'let dose = 3, low = 0.6',
    'S + E <=> C -> E + P | k1 = 2.3, k2 = 0.4, k3 = 1.9',
    'let slow = k3/4',
    'P -> 0 | slow',
    'start S = 2, E = 0.7',
    'event when S < low and t > 0.5: S = S + dose, k1 = k1*0.8 + 0.1*P',
    'event when P > 1.5: E = 0.8*E, k3 = 1.4*k3',
  ].join('\n');
  const names = ['dose', 'low', 'k1', 'k2', 'k3'] as const;
  const values = { dose: 3, low: 0.6, k1: 2.3, k2: 0.4, k3: 1.9 };
  const settings = { times: [1, 3, 6, 9], method: 'auto' as const };
  const { sensitivities, fired } = run(text, { ...settings, sensitivities: [...names] });
  expect(fired!.length).toBeGreaterThan(2);
  fc.assert(
    fc.property(fc.constantFrom(...names), (name) => {
      const step = 1e-4;
      const at = (shift: number) =>
        run(text, { ...settings, constants: { [name]: values[name] + shift } }).species;
      const [up, down] = [at(step), at(-step)];
      for (const species of ['S', 'E', 'C', 'P']) {
        settings.times.forEach((_, i) => {
          const difference = (up[species]![i]! - down[species]![i]!) / (2 * step);
          const found = sensitivities![name]![species]![i]!;
          expect(Math.abs(found - difference)).toBeLessThan(2e-5 * Math.max(1, Math.abs(difference)));
        });
      }
    }),
    { seed: 1, numRuns: 12 },
  );
});

test('sensitivities through events have the same bits by either backend', () => {
  const { network } = readNetwork(
    'let c = 2, d = 7\nA <=> B | k = 0.7, 0.1\nstart A = 10\nevent when A < c: A = d*exp(-c)\n',
  );
  const settings = { network: 'n', until: 6, sensitivities: true } as const;
  expect(evaluateTrajectory(network!, settings, { backend: 'interpreted' })).toEqual(
    evaluateTrajectory(network!, settings, { backend: 'wasm' }),
  );
});

describe('sensitivities of a start that follows constants', () => {
  test('begin with its slope: A = 2b e^(−kt) with b = a²', () => {
    const text = 'let a = 3, b = a^2\nA -> 0 | k = 0.7\nstart A = (2*b)\n';
    const { times, sensitivities } = run(text, { until: 3, points: 7, sensitivities: true });
    times.forEach((t, i) => {
      const decay = Math.exp(-0.7 * t);
      expect(sensitivities!['a']!['A']![i]).toBeCloseTo(4 * 3 * decay, 7);
      expect(sensitivities!['b']!['A']![i]).toBeCloseTo(2 * decay, 7);
      expect(sensitivities!['k']!['A']![i]).toBeCloseTo(-t * 18 * decay, 7);
    });
  });

  test('of a value held constant too: A = e^(−Ct) with C = 2a', () => {
    const text = 'let a = 0.4\nA + C -> C | 1\nstart A = 1\nfix C = (2*a)\n';
    const { times, sensitivities } = run(text, { until: 3, points: 7, sensitivities: ['a'] });
    times.forEach((t, i) => {
      expect(sensitivities!['a']!['A']![i]).toBeCloseTo(-2 * t * Math.exp(-0.8 * t), 7);
      expect(sensitivities!['a']!['C']![i]).toBe(2);
    });
  });

  test('are 0 at the start where it has a value of its own', () => {
    const text = 'let a = 3\nA -> 0 | 0.7\nstart A = (2*a)\n';
    const { sensitivities } = run(text, { until: 1, points: 2, sensitivities: ['a'], start: { A: 6 } });
    expect(sensitivities!['a']!['A']).toEqual([0, 0]);
  });
});

describe('a law that jumps', () => {
  const warningsOf = (text: string, sensitivities: true | string[] | false = true): string[] => {
    const warnings: string[] = [];
    const { network } = readNetwork(text);
    evaluateTrajectory(
      network!,
      { network: 'n', until: 1, points: 2, sensitivities },
      { warn: (words) => void warnings.push(words) },
    );
    return warnings;
  };

  test('where the state is, is told with its line and condition', () => {
    const text = '# a switch\nS -> P | law = k*if(S > c, 1, 0.5)\nlet k = 0.3, c = 1\nstart S = 2\n';
    expect(warningsOf(text)).toEqual([expect.stringContaining('the law of line 2 (S > c)') as string]);
    expect(warningsOf(text, false)).toEqual([]);
  });

  test('by rounding, by a remainder, by an output, or in a rate of its own', () => {
    const told = (law: string) =>
      warningsOf(`S -> P | law = k*${law}\nlet k = 0.3, twice = 2*S\nstart S = 2\n`);
    for (const law of ['floor(S)', '(S % 2)', 'if(twice > 1, 1, 2)']) expect(told(law)).toHaveLength(1);
    for (const law of ['min(S, 1)', 'max(S, 1)', 'abs(S)', 'hill(S, 1, 2)', 'if(t < 1, 1, 2)'])
      expect(told(law)).toEqual([]);
    const own = 'rate X = if(X > 1, a, 0)\nA -> 0 | k = 1\nlet a = 1\n';
    expect(warningsOf(own)[0]).toContain('the rate of X (X > 1)');
  });

  test('at a time that a constant sets counts for that constant alone', () => {
    const text = 'A -> 0 | law = k*if(t < tau, 1, 2)*A\nlet k = 1, tau = 0.5\nstart A = 1\n';
    expect(warningsOf(text, ['k'])).toEqual([]);
    expect(warningsOf(text, ['tau'])).toHaveLength(1);
  });
});
