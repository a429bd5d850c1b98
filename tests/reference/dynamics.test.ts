import { evaluateTrajectory } from '@stillroom/kernel/cells';
import type { TrajectorySettings } from '@stillroom/shared/cells';
import { describe, expect, test } from 'vitest';
import { networkOf, type PlainNetwork } from '../support/network-of.ts';
import table from './dynamics.json' with { type: 'json' };

/** End points of the Test Set for IVP Solvers (Mazzia, Magherini, Bari); courses and closed forms as each entry says. */
interface Entry {
  readonly id: string;
  readonly kind: string;
  readonly problem: PlainNetwork & { readonly times?: readonly number[]; readonly t_end?: number };
  readonly reference: Readonly<Record<string, unknown>>;
}

const entries = table.entries as unknown as readonly Entry[];
const tight = { network: 'n', rtol: 1e-9, atol: 1e-15 } as const;
const ofKind = (...kinds: string[]): [string, Entry][] =>
  entries.filter(({ kind }) => kinds.includes(kind)).map((entry) => [entry.id, entry]);

describe('end points of published stiff problems, to a relative 1e-6', () => {
  const problems = ofKind('ode_end_point');

  test('HIRES, POLLU, OREGO and ROBER are all there', () => expect(problems).toHaveLength(4));

  test.each(problems.flatMap(([id, entry]) => [['stiff', id, entry] as const, ['auto', id, entry] as const]))(
    'method %s: %s',
    (method, _, { problem, reference }) => {
      const { species, ended } = evaluateTrajectory(networkOf(problem), {
        ...tight,
        method,
        until: problem.t_end!,
        points: 2,
      });
      expect(ended).toBe('complete');
      for (const [name, value] of Object.entries(reference as Record<string, number>)) {
        expect(Math.abs(species[name]!.at(-1)! - value) / Math.abs(value), name).toBeLessThan(1e-6);
      }
    },
  );
});

describe('courses and closed forms, to 1e-7 of the largest value of each species', () => {
  const problems = ofKind('ode_trajectory', 'ode_closed_form');

  test('all are there', () => expect(problems).toHaveLength(17));

  test.each(
    problems.flatMap(([id, entry]) =>
      (['stiff', 'nonstiff', 'auto'] as const).map((method) => [method, id, entry] as const),
    ),
  )('method %s: %s', (method, _, { problem, reference }) => {
    const settings: TrajectorySettings = { ...tight, method, times: [...problem.times!] };
    const result = evaluateTrajectory(networkOf(problem), settings);
    const { species, values } = reference as { species: string[]; values: number[][] };
    expect(result.times).toEqual(problem.times);
    expect(result.conservationDrift ?? 0).toBeLessThan(1e-12);
    species.forEach((name, column) => {
      const expected = values.map((row) => row[column]!);
      const largest = Math.max(...expected.map(Math.abs));
      expected.forEach((value, i) =>
        expect(Math.abs(result.species[name]![i]! - value)).toBeLessThan(1e-7 * largest),
      );
    });
  });
});
