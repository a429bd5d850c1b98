import type { NetworkResult } from '@stillroom/shared/cells';
import { describe, expect, test } from 'vitest';
import { reactionLines } from '../../../../packages/client/src/components/results/reactionLines.ts';

const result = (reactions: NetworkResult['reactions']): NetworkResult => ({
  species: ['E', 'S', 'ES', 'P'],
  constants: [
    { name: 'kf', value: 0.1, unit: '/uM/s' },
    { name: 'kr', value: 2, unit: '/s' },
    { name: 'kc', value: null, unit: null },
  ],
  start: {},
  reactions,
  equations: [],
  canonical: '',
  counts: { species: 4, reactions: reactions.length, constants: 3 },
  units: null,
});

describe('the lines of a scheme', () => {
  const mechanism = result([
    { label: 'E + S -> ES', row: 0, from: { E: 1, S: 1 }, to: { ES: 1 }, rate: 'kf*E*S', note: '' },
    { label: 'ES -> E + S', row: 0, from: { ES: 1 }, to: { E: 1, S: 1 }, rate: 'kr*ES', note: '' },
    { label: 'ES -> E + P', row: 0, from: { ES: 1 }, to: { E: 1, P: 1 }, rate: 'kc*ES', note: '' },
  ]);

  test('a reversible pair is one line; the row is numbered once', () => {
    const lines = reactionLines(mechanism, ['binding']);
    expect(lines).toHaveLength(2);
    expect(lines[0]?.backward?.name).toBe('kr');
    expect(lines.map(({ row }) => row)).toEqual([0, null]);
    expect(lines.map(({ note }) => note)).toEqual(['binding', '']);
  });

  test('constants carry value and unit; a missing value stays missing', () => {
    const [binding, turnover] = reactionLines(mechanism, []);
    expect(binding?.forward).toEqual({ name: 'kf', value: 0.1, unit: '/uM/s', law: null });
    expect(turnover?.forward.value).toBeNull();
  });

  test('a law is shown as it is written', () => {
    const [line] = reactionLines(
      result([{ label: 'S -> P', row: 0, from: { S: 1 }, to: { P: 1 }, rate: 'kc*S/(kr + S)', note: '' }]),
      [],
    );
    expect(line?.forward).toEqual({ name: null, value: null, unit: null, law: 'kc*S/(kr + S)' });
  });

  test('a power of a reactant is still mass action', () => {
    const [line] = reactionLines(
      result([{ label: '2 S -> P', row: 0, from: { S: 2 }, to: { P: 1 }, rate: 'kc*S^2', note: '' }]),
      [],
    );
    expect(line?.forward.name).toBe('kc');
  });
});
