import { evaluateTrajectory, type TrajectoryOptions } from '@stillroom/kernel/cells';
import { RateError } from '@stillroom/kernel/rates';
import type { TrajectoryResult, TrajectorySettings } from '@stillroom/shared/cells';
import type { Expression, FunctionName } from '@stillroom/shared/expression';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import table from '../../reference/dynamics.json' with { type: 'json' };
import {
  binary,
  compare,
  name,
  networkOf,
  num,
  type PlainNetwork,
  type PlainReaction,
} from '../../support/network-of.ts';

const run = (
  network: PlainNetwork,
  settings: Omit<TrajectorySettings, 'network'>,
  options?: TrajectoryOptions,
): TrajectoryResult => evaluateTrajectory(networkOf(network), { network: 'n', ...settings }, options);

const tight = { rtol: 1e-10, atol: 1e-14 } as const;
const call = (text: FunctionName, ...given: Expression[]): Expression => ({
  kind: 'call',
  name: text,
  arguments: given,
});
const decay: PlainNetwork = { reactions: [{ from: { A: 1 }, to: { B: 1 }, k: 0.7 }], initial: { A: 10 } };

describe('the times of a course', () => {
  test('are 201 equally spaced ones, both ends included, unless asked otherwise', () => {
    const { times, species } = run(decay, { until: 4 });
    expect(times).toHaveLength(201);
    expect(times[0]).toBe(0);
    expect(times[1]).toBeCloseTo(0.02, 15);
    expect(times.at(-1)).toBe(4);
    expect(species['A']).toHaveLength(201);
    expect(run(decay, { until: 4, points: 3 }).times).toEqual([0, 2, 4]);
    expect(run(decay, { times: [1, 2] }).times).toEqual([1, 2]);
  });

  test('must ascend and fit the end', () => {
    expect(() => run(decay, { times: [1, 1] })).toThrow('"times" must ascend, but 1 follows 1.');
    expect(() => run(decay, { times: [1, 3], until: 2 })).toThrow('"until" is 2, but "times" go on to 3.');
  });
});

describe('values', () => {
  test('of a cell replace those of the text', () => {
    const { species } = run(decay, { until: 1, points: 2, constants: { k1: 2 }, start: { B: 1 }, ...tight });
    expect(species['A']!.at(-1)).toBeCloseTo(10 * Math.exp(-2), 8);
    expect(species['B']!.at(-1)).toBeCloseTo(1 + 10 * (1 - Math.exp(-2)), 8);
  });

  test('of unknown names are refused with the names that there are', () => {
    expect(() => run(decay, { until: 1, constants: { q: 1 } })).toThrow(
      '"constants" gives a value to q, but the network has no constant of that name.',
    );
    expect(() => run(decay, { until: 1, start: { Q: 1 } })).toThrow(
      'the network has no species of that name',
    );
  });

  test('that are missing are all named, if anything uses them', () => {
    const open: PlainNetwork = {
      reactions: [
        { from: { A: 1 }, to: {}, law: binary(name('k'), '*', name('A')) },
        { from: {}, to: { A: 1 }, law: name('feed') },
      ],
      constants: { feed: null, unused: null, k: null },
    };
    expect(() => run(open, { until: 1 })).toThrow('feed and k have no value.');
    expect(() => run(open, { until: 1 })).toThrow(RateError);
    expect(run(open, { until: 1, constants: { feed: 1, k: 2 } }).ended).toBe('complete');
  });
});

describe('rates', () => {
  test('a fixed species drives its reactions and does not move', () => {
    const { species } = run(
      { reactions: [{ from: { F: 1, A: 1 }, to: { A: 2 }, k: 0.5 }], initial: { A: 1 }, fixed: { F: 2 } },
      { until: 1, points: 2, ...tight },
    );
    expect(species['F']).toEqual([2, 2]);
    expect(species['A']!.at(-1)).toBeCloseTo(Math.E, 8);
  });

  test('a law replaces mass action, outputs follow the course, a rate rule moves its species', () => {
    const half = binary(name('A'), '/', num(2));
    const { species, derived } = run(
      {
        reactions: [{ from: { A: 1 }, to: { B: 2 }, law: name('v') }],
        initial: { A: 8 },
        outputs: { v: half, undefinedAtStart: call('ln', name('B')) },
        rateRules: { C: call('cos', name('t')) },
      },
      { until: 3, points: 4, ...tight },
    );
    species['A']!.forEach((value, t) => expect(value).toBeCloseTo(8 * Math.exp(-t / 2), 8));
    species['B']!.forEach((value, t) => expect(value).toBeCloseTo(16 * (1 - Math.exp(-t / 2)), 8));
    species['C']!.forEach((value, t) => expect(value).toBeCloseTo(Math.sin(t), 8));
    derived['v']!.forEach((value, t) => expect(value).toBeCloseTo(4 * Math.exp(-t / 2), 8));
    expect(derived['undefinedAtStart']![0]).toBeNull();
    expect(derived['undefinedAtStart']![3]).toBeCloseTo(Math.log(16 * (1 - Math.exp(-1.5))), 8);
  });

  test('non-integer coefficients follow their power: x\u2032 = −2 x^(1/2) reaches 0 at t = 1', () => {
    const network = networkOf({ reactions: [{ from: { X: 1 }, to: {}, k: 2 }], initial: { X: 1 } });
    const denominators = Float64Array.from([2]);
    const root = { ...network, complexes: { ...network.complexes, denominators } };
    const { species } = evaluateTrajectory(root, { network: 'n', times: [0, 0.5, 1], ...tight });
    expect(species['X']![1]).toBeCloseTo((1 - 0.25) ** 2, 7);
  });

  test('a law across compartments is an amount per time', () => {
    const { species, conservationDrift } = run(
      {
        reactions: [{ from: { A: 1 }, to: { B: 1 }, law: binary(num(6), '*', name('A')) }],
        initial: { A: 1 },
        compartments: [
          { name: 'cell', volume: 2, species: ['A'] },
          { name: 'nucleus', volume: 0.5, species: ['B'] },
        ],
      },
      { until: 1, points: 2, ...tight },
    );
    expect(species['A']!.at(-1)).toBeCloseTo(Math.exp(-3), 8);
    expect(species['B']!.at(-1)).toBeCloseTo((2 / 0.5) * (1 - Math.exp(-3)), 8);
    expect(conservationDrift).toBeLessThan(1e-14);
  });

  test('mass action across compartments is refused at its line', () => {
    const across: PlainNetwork = {
      reactions: [{ from: { A: 1 }, to: { B: 1 }, k: 1 }],
      compartments: [
        { name: 'cell', volume: 2, species: ['A'] },
        { name: 'nucleus', volume: 0.5, species: ['B'] },
      ],
    };
    expect(() => run(across, { until: 1 })).toThrow('The reaction on line 1 goes across compartments');
  });
});

describe('sensitivities', () => {
  test.each(['stiff', 'nonstiff', 'auto'] as const)(
    'agree with the closed form of a reversible pair (%s)',
    (method) => {
      const pair: PlainNetwork = {
        reactions: [{ from: { A: 1 }, to: { B: 1 }, k: 2, kr: 1 }],
        initial: { A: 3 },
      };
      const { times, sensitivities } = run(pair, {
        until: 2,
        points: 9,
        method,
        sensitivities: true,
        ...tight,
      });
      times.forEach((t, i) => {
        const decayed = Math.exp(-3 * t);
        expect(sensitivities!['k1']!['A']![i]).toBeCloseTo(-1 / 3 + decayed / 3 - 2 * t * decayed, 8);
        expect(sensitivities!['k2']!['A']![i]).toBeCloseTo(2 / 3 - (2 / 3) * decayed - 2 * t * decayed, 8);
        expect(sensitivities!['k1']!['B']![i]).toBeCloseTo(1 / 3 - decayed / 3 + 2 * t * decayed, 8);
      });
    },
  );

  test('agree with differences of courses where rates are not linear', () => {
    const network: PlainNetwork = {
      reactions: [
        { from: {}, to: { X: 1 }, law: call('hill', name('Y'), name('K'), name('n')) },
        { from: { X: 2 }, to: { Y: 1 }, k: 0.4, kr: 0.3 },
      ],
      initial: { X: 1, Y: 0.5 },
      constants: { K: 0.7, n: 2.5 },
    };
    const settings = { until: 5, points: 6, ...tight };
    const { sensitivities } = run(network, { ...settings, sensitivities: ['K', 'n'] });
    for (const [constant, value] of [
      ['K', 0.7],
      ['n', 2.5],
    ] as const) {
      const at = (shift: number) =>
        run(network, { ...settings, constants: { [constant]: value + shift } }).species['X']!;
      const [up, down] = [at(1e-4), at(-1e-4)];
      up.forEach((high, i) =>
        expect(sensitivities![constant]!['X']![i]).toBeCloseTo((high - down[i]!) / 2e-4, 6),
      );
    }
  });

  test('are asked by names that exist', () => {
    expect(() => run(decay, { until: 1, sensitivities: ['q'] })).toThrow('asks for q');
  });
});

describe('events', () => {
  const halve = { line: 2, when: compare(name('A'), '<', num(5)), set: [{ name: 'A', value: num(10) }] };

  test.each(['stiff', 'nonstiff', 'auto'] as const)(
    'fire when their condition turns true, each time anew (%s)',
    (method) => {
      const { fired, species, times } = run(
        { ...decay, events: [halve] },
        { until: 3.5, points: 8, method, ...tight },
      );
      const period = Math.LN2 / 0.7;
      expect(fired).toHaveLength(3);
      fired!.forEach(({ time, event }, i) => {
        expect(time).toBeCloseTo(period * (i + 1), 8);
        expect(event).toBe(0);
      });
      times.forEach((t, i) => expect(species['A']![i]).toBeCloseTo(10 * Math.exp(-0.7 * (t % period)), 7));
    },
  );

  test.each(['>=', '=='] as const)(
    'at a time (t %s 2.5) are met exactly, and the sample there is the one after',
    (sign) => {
      const set = [{ name: 'k1', value: num(0) }];
      const event = { line: 2, when: compare(name('t'), sign, num(2.5)), set };
      const { fired, species } = run({ ...decay, events: [event] }, { times: [2.5, 9], ...tight });
      expect(fired).toEqual([{ time: 2.5, event: 0 }]);
      expect(species['A']![1]).toBe(species['A']![0]);
    },
  );

  test('do not fire for what is true from the start', () => {
    const event = { ...halve, when: compare(name('A'), '>', num(0)) };
    expect(run({ ...decay, events: [event] }, { until: 3 }).fired).toBeUndefined();
  });

  test('take their values from before any of their assignments, and set each other off', () => {
    const swap = {
      line: 2,
      when: compare(name('t'), '>=', num(1)),
      set: [
        { name: 'A', value: name('B') },
        { name: 'B', value: name('A') },
      ],
    };
    const then = { line: 3, when: compare(name('B'), '>', num(50)), set: [{ name: 'B', value: num(1) }] };
    const still: PlainNetwork = {
      reactions: [{ from: { C: 1 }, to: {}, k: 1 }],
      rateRules: { A: num(0), B: num(0) },
      initial: { A: 60, B: 3 },
    };
    const { fired, species } = run({ ...still, events: [swap, then] }, { times: [0, 1, 2] });
    expect(fired).toEqual([
      { time: 1, event: 0 },
      { time: 1, event: 1 },
    ]);
    expect(species['A']).toEqual([60, 3, 3]);
    expect(species['B']).toEqual([3, 1, 1]);
  });

  test('that set each other off for ever end the course in words', () => {
    const toggle = (limit: '>' | '<', value: number) => ({
      line: 2,
      when: compare(name('A'), limit, num(5)),
      set: [{ name: 'A', value: num(value) }],
    });
    const { ended, why } = run({ ...decay, events: [toggle('<', 9), toggle('>', 1)] }, { until: 3 });
    expect(ended).toBe('stopped');
    expect(why).toContain('Events set each other off');
  });

  test('follow conditions joined by and, or and not', () => {
    const both: Expression = {
      kind: 'logic',
      operator: 'and',
      left: { kind: 'not', of: compare(name('A'), '>', num(8)) },
      right: {
        kind: 'logic',
        operator: 'or',
        left: compare(name('t'), '>=', num(2)),
        right: compare(name('B'), '>=', num(7)),
      },
    };
    const event = { line: 2, when: both, set: [{ name: 'B', value: num(0) }] };
    const time = Math.log(10 / 3) / 0.7;
    expect(run({ ...decay, events: [event] }, { until: 1.9, ...tight }).fired![0]!.time).toBeCloseTo(time, 8);
  });
});

describe('trouble ends a course in words and keeps what there is', () => {
  test.each(['stiff', 'nonstiff', 'auto'] as const)(
    '2 A -> 3 A grows without bound at t = 1 (%s)',
    (method) => {
      const explosion: PlainNetwork = {
        reactions: [{ from: { A: 2 }, to: { A: 3 }, k: 1 }],
        initial: { A: 1 },
      };
      const { ended, why, times, species } = run(explosion, { until: 2, points: 21, method });
      expect(ended).toBe('stopped');
      expect(why).toMatch(/^A grows without bound: .* near t = 1,/);
      expect(times.slice(0, 10)).toHaveLength(10);
      expect(times.at(-1)).toBeCloseTo(1, 5);
      expect(species['A']![5]).toBeCloseTo(2, 3);
    },
  );

  test('exponential growth beyond the largest number', () => {
    const { ended, why } = run(
      { reactions: [{ from: { X: 1 }, to: { X: 2 }, k: 1 }], initial: { X: 1 } },
      { until: 1e4 },
    );
    expect(ended).toBe('stopped');
    expect(why).toContain('X grows without bound');
  });

  test('a stiff problem by the explicit method reaches the limit of steps and says what to do', () => {
    const rober = table.entries.find(({ id }) => id === 'ivp_rober')!.problem as unknown as PlainNetwork;
    const { ended, why, times } = run(rober, { until: 1e11, method: 'nonstiff' });
    expect(ended).toBe('stopped');
    expect(why).toContain('the equations are stiff');
    expect(times.at(-1)).toBeGreaterThan(0);
  });

  test('a rate that stops being a number', () => {
    const law = call('ln', binary(num(1), '-', name('t')));
    const { ended, why, times } = run({ reactions: [{ from: {}, to: { A: 1 }, law }] }, { until: 2 });
    expect(ended).toBe('stopped');
    expect(why).toMatch(/^The (rates stop being finite|steps became smaller)/);
    expect(times.at(-1)).toBeCloseTo(1, 4);
  });

  test('the deadline', () => {
    let asked = 0;
    const shares: number[] = [];
    const result = run(
      { ...decay },
      { until: 1000 },
      { deadline: () => ++asked > 2, progress: (share) => shares.push(share) },
    );
    expect(result.ended).toBe('stopped');
    expect(result.why).toContain('The run was ended at');
    expect(shares[0]).toBe(0);
    expect(result.times.length).toBeGreaterThan(0);
  });
});

describe('the two backends', () => {
  const networks = table.entries.filter(({ kind }) => kind.startsWith('ode_'));

  test.each(networks.map((entry) => [entry.id, entry] as const))(
    'give the same bits: %s',
    (_, { problem }) => {
      const plain = problem as unknown as PlainNetwork & { times?: number[]; t_end?: number };
      for (const method of ['stiff', 'auto'] as const) {
        const settings = { until: plain.t_end ?? plain.times!.at(-1)!, points: 11, method, rtol: 1e-5 };
        expect(run(plain, settings, { backend: 'interpreted' })).toEqual(
          run(plain, settings, { backend: 'wasm' }),
        );
      }
    },
  );

  test('give the same bits with laws, events and sensitivities', () => {
    const oscillator: PlainNetwork = {
      reactions: [
        {
          from: {},
          to: { M: 1 },
          law: binary(name('a'), '/', binary(num(1), '+', binary(name('P'), '^', name('n')))),
        },
        { from: { M: 1 }, to: {}, k: 1 },
        { from: {}, to: { P: 1 }, law: call('exp', call('sin', name('t'))) },
        { from: { P: 1 }, to: {}, law: call('max', name('P'), call('sqrt', call('abs', name('M')))) },
      ],
      constants: { a: 5, n: 2.2 },
      initial: { M: 0.1 },
    };
    const event = { line: 9, when: compare(name('P'), '>', num(1)), set: [{ name: 'a', value: num(7) }] };
    for (const [network, sensitivities] of [
      [oscillator, ['a', 'n']],
      [{ ...oscillator, events: [event] }, []],
    ] as const) {
      for (const method of ['stiff', 'nonstiff'] as const) {
        const settings = { until: 10, points: 21, method, sensitivities: [...sensitivities] };
        expect(run(network, settings, { backend: 'interpreted' })).toEqual(
          run(network, settings, { backend: 'wasm' }),
        );
      }
    }
  });
});

/** Random closed networks: complexes of up to two molecules of four species, both sides of equal size. */
const names = ['A', 'B', 'C', 'D'] as const;
const side = (size: number) => fc.array(fc.constantFrom(...names), { minLength: size, maxLength: size });
const reaction: fc.Arbitrary<PlainReaction> = fc
  .integer({ min: 1, max: 2 })
  .chain((size) =>
    fc
      .record({ from: side(size), to: side(size), k: fc.double({ min: 0.01, max: 100, noNaN: true }) })
      .map(({ from, to, k }) => ({ from: counted(from), to: counted(to), k })),
  );
const closed = fc.record({
  reactions: fc.array(reaction, { minLength: 1, maxLength: 6 }),
  initial: fc.record(
    Object.fromEntries(names.map((text) => [text, fc.double({ min: 0, max: 10, noNaN: true })])),
  ),
});

function counted(list: readonly string[]): Record<string, number> {
  const counts: Record<string, number> = {};
  for (const text of list) counts[text] = (counts[text] ?? 0) + 1;
  return counts;
}

describe('on random closed networks', () => {
  test('every conservation law is kept to round-off', () => {
    fc.assert(
      fc.property(closed, fc.constantFrom('stiff', 'nonstiff', 'auto'), (network, method) => {
        const { conservationDrift, ended } = run(network, { until: 5, points: 2, method });
        expect(ended).toBe('complete');
        expect(conservationDrift ?? 0).toBeLessThan(1e-12);
      }),
      { seed: 7, numRuns: 60 },
    );
  });

  test('going on from where a course ended is the same as not stopping', () => {
    fc.assert(
      fc.property(closed, (network) => {
        const whole = run(network, { times: [1, 2.5], rtol: 1e-9, atol: 1e-12 }).species;
        const start = Object.fromEntries(Object.entries(whole).map(([text, values]) => [text, values[0]!]));
        const rest = run({ ...network, initial: start }, { times: [1.5], rtol: 1e-9, atol: 1e-12 }).species;
        for (const [text, values] of Object.entries(whole)) expect(rest[text]![0]).toBeCloseTo(values[1]!, 6);
      }),
      { seed: 8, numRuns: 40 },
    );
  });

  test('both methods agree', () => {
    fc.assert(
      fc.property(closed, (network) => {
        const settings = { until: 3, points: 4, rtol: 1e-8, atol: 1e-11 };
        const stiff = run(network, { ...settings, method: 'stiff' }).species;
        const nonstiff = run(network, { ...settings, method: 'nonstiff' }).species;
        for (const [text, values] of Object.entries(stiff)) {
          values.forEach((value, i) => expect(nonstiff[text]![i]).toBeCloseTo(value, 5));
        }
      }),
      { seed: 9, numRuns: 40 },
    );
  });
});
