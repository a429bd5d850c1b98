import { describe, expect, test } from 'vitest';
import type { CellInput, CellJob, CellSettings } from '@stillroom/shared/cells';
import { structureSettings } from '@stillroom/shared/cells';
import { readNetwork } from '@stillroom/shared/notation';
import { analyseStructure } from '@stillroom/kernel/cells';
import { evaluateCell } from '@stillroom/kernel/engine';
import { buildNetwork } from '../../support/network.ts';

const plain = { judge: () => [] };

const read = (text: string) => {
  const { network, complaints } = readNetwork(text);
  expect(complaints.filter(({ severity }) => severity === 'error')).toEqual([]);
  return network!;
};

describe('the result of a structure cell', () => {
  test('of an open enzyme mechanism', () => {
    const result = analyseStructure(
      read('E + S <=> ES -> E + P | kf, kr, kc\n0 <=> S | feed, wash\nP -> 0 | wash'),
      plain,
    );
    expect(result.counts).toEqual({
      species: 4,
      complexes: 6,
      reactions: 6,
      linkageClasses: 2,
      strongLinkageClasses: 4,
      terminalStrongLinkageClasses: 2,
      rank: 3,
      deficiency: 1,
    });
    expect(result.complexes?.map(({ label }) => label)).toEqual(['E + S', 'ES', 'E + P', '0', 'S', 'P']);
    expect(result.reactions?.[1]).toEqual({
      row: 0,
      label: 'ES -> E + S',
      from: 1,
      to: 0,
      constant: 'kr',
      reverse: 0,
      law: 'mass action',
    });
    expect(result.conservationLaws).toEqual([{ id: 'T1', law: { E: 1, ES: 1 }, of: 'E + ES', terms: 2 }]);
    expect(result.siphons).toEqual([{ species: ['E', 'ES'], critical: false, law: { E: 1, ES: 1 } }]);
    expect(result.terminalStrongClasses).toEqual([[2], [3, 4]]);
    expect([result.conservative, result.consistent]).toEqual([false, true]);
    expect(result.complete).toEqual({
      conservationLaws: true,
      nonnegativeConservationLaws: true,
      siphons: true,
    });
    expect(result.reduced).toBe(false);
    expect('asWritten' in result).toBe(false);
  });

  test('with a fixed species shows both sets of counts', () => {
    // theory: A + X -> 2X, X -> 0 with A fixed has deficiency 1; as written 0.
    const result = analyseStructure(read('A + X -> 2 X | a\nX -> 0 | b\nfix A = 1'), plain);
    expect(result.reduced).toBe(true);
    expect(result.counts.deficiency).toBe(1);
    expect(result.asWritten?.deficiency).toBe(0);
    expect(result.matrices?.Ak?.entries[0]?.[0]).toBe('-a*A - b');
  });

  test('typesets Y, I_a, N and A_k', () => {
    const { matrices } = analyseStructure(read('1/2 A <=> B | k1, k2\n2 A -> A | k3'), plain);
    expect(matrices?.Y.rows).toEqual(['A', 'B']);
    expect(matrices?.Y.columns).toEqual(['1/2 A', 'B', '2 A', 'A']);
    expect(matrices?.Y.entries).toEqual([
      ['1/2', 0, 2, 1],
      [0, 1, 0, 0],
    ]);
    expect(matrices?.N.entries).toEqual([
      ['-1/2', '1/2', -1],
      [1, -1, 0],
    ]);
    expect(matrices?.N.tex).toBe(
      '\\left(\\begin{array}{ccc}-\\tfrac{1}{2} & \\tfrac{1}{2} & -1 \\\\ 1 & -1 & 0\\end{array}\\right)',
    );
    expect(matrices?.Ia.entries.map((row) => [...row])).toEqual([
      [-1, 1, 0],
      [1, -1, 0],
      [0, 0, -1],
      [0, 0, 1],
    ]);
    expect(matrices?.Ak?.entries[1]).toEqual(['k1', '-k2', 0, 0]);
    const other = analyseStructure(read('A -> B | law = A / (1 + A)'), plain);
    expect(other.reactions?.[0]).toMatchObject({ constant: null, law: 'other' });
    expect('Ak' in other.matrices!).toBe(false);
  });

  test('is the same on a second run, byte for byte', () => {
    const network = () => read('A + B <=> C | k1, k2\nC -> D + A | k3\nD -> B | k4');
    expect(JSON.stringify(analyseStructure(network()))).toBe(JSON.stringify(analyseStructure(network())));
  });

  test('compares with a variant of the network', () => {
    const result = analyseStructure(buildNetwork('S + E -> C; C -> E + P'), {
      compare: [{ name: 'reversible', network: buildNetwork('E + S <=> C; C -> E + P; P -> S') }],
    });
    const [variant] = result.comparisons!;
    expect(variant).toMatchObject({
      network: 'reversible',
      onlyHere: [],
      onlyThere: ['C -> E + S', 'P -> S'],
      consistent: true,
    });
    expect(variant?.counts.linkageClasses).toBe(2);
    expect(variant?.verdicts).toContainEqual({
      id: 'no-positive-steady-state',
      here: 'yes',
      there: 'no',
    });
  });

  test('leaves long lists out above twenty thousand complexes, and keeps counts and laws', () => {
    const result = analyseStructure(read('[i = 1..20001] X[i] <=> X[i % 20001 + 1] | p, q'), plain);
    expect(result.listed).toBe(false);
    expect('complexes' in result || 'reactions' in result || 'linkageClasses' in result).toBe(false);
    expect(result.counts).toMatchObject({ complexes: 20001, reactions: 40002, rank: 20000, deficiency: 0 });
    expect(result.conservationLaws).toEqual([
      {
        id: 'T1',
        of: 'X[1] + X[2] + X[3] + X[4] + X[5] + X[6] + … (20001 species)',
        terms: 20001,
      },
    ]);
    expect(result.conservative).toBe(true);
    expect(result.notes).not.toEqual([]);
  });

  test('names the robust species of the verdict', () => {
    // Shinar, Feinberg 2010: B + A -> 2 B, B -> A is robust in A.
    expect(analyseStructure(buildNetwork('A + B -> 2 B; B -> A')).robustSpecies).toEqual(['A']);
    expect(analyseStructure(buildNetwork('A <=> B')).robustSpecies).toEqual([]);
  });

  test('reports progress in order and may be ended', () => {
    const shares: number[] = [];
    analyseStructure(buildNetwork('A <=> B'), {
      ...plain,
      compare: [{ name: 'other', network: buildNetwork('A -> B') }],
      checkpoint: (progress) => {
        if (progress !== undefined) shares.push(progress);
      },
    });
    expect(shares).toEqual([...shares].sort((a, b) => a - b));
    expect(shares.at(-1)).toBeLessThanOrEqual(1);
    const stop = new Error('stop');
    expect(() =>
      analyseStructure(buildNetwork('A <=> B'), {
        checkpoint: () => {
          throw stop;
        },
      }),
    ).toThrow(stop);
  });

  test('the engine computes the cell from the networks it draws on', () => {
    const network = (text: string): CellInput => ({ kind: 'network', digest: 'sha256:0', text });
    const job = (settings: CellSettings): CellJob => ({
      digest: 'sha256:1',
      kind: 'structure',
      text: '',
      settings,
      inputs: { enzyme: network('E + S <=> ES -> E + P'), other: network('E + S <=> ES <=> E + P') },
    });
    const control = { checkpoint: () => undefined };
    const outcome = evaluateCell(job({ network: 'enzyme', compare: ['other'] }), control);
    expect(outcome.status).toBe('ok');
    expect(outcome.result).toMatchObject({
      counts: { deficiency: 0 },
      comparisons: [{ network: 'other', weaklyReversible: true, onlyThere: ['E + P -> ES'] }],
    });
    expect(evaluateCell(job({ network: 'missing' }), control)).toMatchObject({
      status: 'failed',
      error: { message: 'There is no cell called missing.' },
    });
  });

  test('settings name a network and variants', () => {
    expect(structureSettings.safeParse({ network: 'a', compare: ['b', 'c'] }).success).toBe(true);
    expect(structureSettings.safeParse({ network: 'a', comparison: [] }).success).toBe(false);
  });
});
