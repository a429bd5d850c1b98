import { describe, expect, test } from 'vitest';
import { readNetwork } from '@stillroom/shared/notation';
import { networkOf, valuesOf, warningsOf } from './reading.ts';

const unitsOf = (text: string) =>
  Object.fromEntries(networkOf(text).constants.map(({ name, unit }) => [name, unit]));
const errorsOf = (text: string) =>
  readNetwork(text)
    .complaints.filter(({ severity }) => severity === 'error')
    .map(({ message }) => message);

describe('units', () => {
  test('results are in the first time and amount unit of the text, converted exactly', () => {
    const text =
      'A + B -> C | k = 0.1 /uM/s\nC -> A | q = 3 /min\n0 -> A | f = 7 nM/h\nstart A = 2 mM, B = 30 nM';
    const network = networkOf(text);
    expect(network.units).toEqual({ time: 's', amount: 'uM', volume: null });
    expect(network.constants.map(({ name, unit, quantity }) => [name, unit, quantity?.exact])).toEqual([
      ['k', '/uM/s', { numerator: 1n, denominator: 10n }],
      ['q', '/s', { numerator: 1n, denominator: 20n }],
      ['f', 'uM/s', { numerator: 7n, denominator: 3_600_000n }],
    ]);
    expect([...network.start.values()].map(({ value }) => value)).toEqual([2000, 0.03]);
  });

  test('amount units may be quotients', () => {
    const network = networkOf(
      'T + V -> I | b = 2.4e-8 mL/cells/d\nI -> 0 | d = 0.5 /d\nstart T = 1e6 cells/mL',
    );
    expect(network.units).toEqual({ time: 'd', amount: 'cells/mL', volume: null });
    expect(unitsOf('T + V -> I | b = 2.4e-8 mL/cells/d')).toEqual({ b: 'mL/cells/d' });
    expect(networkOf('A + B -> C | k = 1 L/mol/s\nstart A = 1 M').units.amount).toBe('mol/L');
  });

  test('a flow in a law is no amount: a bare volume counts only where an amount must stand', () => {
    const text = 'volume cell = 2 L, sea = 9 L\nin sea: B\nA -> B | law = (0.5 L/s)*A\nstart A = 3 mM\n';
    const network = networkOf(text);
    expect(network.units).toEqual({ time: 's', amount: 'mM', volume: 'L' });
    expect([...network.start.values()].map(({ value }) => value)).toEqual([3]);
    expect(networkOf('A -> 0 | law = (2 mL/h)*A/(3 L)\nA -> B | k = 1 /h\nstart A = 5 uM').units).toEqual({
      time: 'h',
      amount: 'uM',
      volume: null,
    });
    // Numbers per volume, where an amount must stand.
    expect(networkOf('A + B -> C | k = 1 L/s\nstart A = 4 /L').units.amount).toBe('/L');
    // A mass in a law tells an amount, as ever.
    expect(networkOf('0 -> A | law = (2 g/L/h)').units.amount).toBe('g/L');
  });

  test('M and mol/L are the same; prefixes and µ in any spelling too', () => {
    const network = networkOf(
      '0 -> A | a = 1 uM/s\n0 -> A | b = 1 µM/s\n0 -> A | c = 1 μM/s\n0 -> A | d = 1 umol/L/s',
    );
    expect(valuesOf(network)).toEqual({ a: 1, b: 1, c: 1, d: 1 });
  });

  test('a constant without value has the unit of its order', () => {
    expect(unitsOf('2 A -> B | k\nB -> 0 | q = 1 /h\nstart A = 3 nM')).toEqual({ k: '/nM/h', q: '/h' });
    expect(unitsOf('A -> B | k = 1')).toEqual({ k: null });
  });

  test('a let carries its unit to the rates it gives', () => {
    const text = 'A + B -> C | k\nlet k = 2*base\nlet base = 3 /mM/s\nstart A = 1 mM, B = 1 mM';
    expect(networkOf(text).constants.map(({ name, unit }) => [name, unit])).toEqual([
      ['k', '/mM/s'],
      ['base', '/mM/s'],
    ]);
    expect(errorsOf('A -> B | k\nlet k = 2*base\nlet base = 3 /mM/s')).toEqual([
      'k is in /mM/s, but A -> B is of order 1 and needs /s.',
    ]);
  });

  test('a mismatch names both units; one value with a unit asks for all', () => {
    expect(errorsOf('A + B -> C | k = 2 /s\nstart A = 1 uM')).toEqual([
      'k is in /s, but A + B -> C is of order 2 and needs /uM/s.',
    ]);
    expect(errorsOf('A -> B | k = 2 /s\nstart A = 1')).toEqual([
      'The value of A has no unit, but other values of this text have.',
    ]);
    expect(errorsOf('A -> B | k = 2 /s\nstart A = 1 uM, B = 3 molecules')).toEqual([
      'The value of B is in molecules, but amounts of this text are in uM and needs uM.',
    ]);
  });

  test('a name goes before a unit after /, but not in a rate constant', () => {
    expect(valuesOf(networkOf('let L = 4\nlet q = 1/L'))).toEqual({ L: 4, q: 0.25 });
    expect(valuesOf(networkOf('s + A -> s | k = 2 /uM/s\nstart A = 1 uM, s = 1 uM'))).toEqual({ k: 2 });
    const { outputs } = networkOf('s -> 0\nlet inverse = 1/s');
    expect(outputs.map(({ name }) => name)).toEqual(['inverse']);
    expect(valuesOf(networkOf('let m[s] = 6/s for s = 1..3'))).toEqual({ 'm[1]': 6, 'm[2]': 3, 'm[3]': 2 });
  });

  test('in a text with units a number and /d is in units, also where d is a name, with a warning', () => {
    const text = 'A -> B | d = 0.5 /d\nB -> A | a\nlet a = 0.25 /d';
    expect(valuesOf(networkOf(text))).toEqual({ d: 0.5, a: 0.25 });
    expect(warningsOf(text)).toEqual(['/d is read as a unit here, though this text has a d.']);
    expect(valuesOf(networkOf('let d = 2 /d\nlet c = 3 uM'))['d']).toBe(2);
  });

  test('volumes', () => {
    const network = networkOf(
      'A -> B | k = 1 /s\nstart A = 1 uM\nvolume cell = 2 pL, nucleus = 500 fL\nin nucleus: B',
    );
    expect(network.units.volume).toBe('pL');
    expect(network.compartments).toEqual([
      {
        name: 'cell',
        volume: { value: 2, exact: { numerator: 2n, denominator: 1n } },
        unit: 'pL',
        species: [],
      },
      {
        name: 'nucleus',
        volume: { value: 0.5, exact: { numerator: 1n, denominator: 2n } },
        unit: 'pL',
        species: [1],
      },
    ]);
  });

  test('numbers with units in laws are in the units of the results', () => {
    const { laws } = networkOf('start A = 1 uM\nA -> B | law = 2 nM/s*A/(A + 3 mM)');
    expect(JSON.stringify(laws[0]?.expression)).toContain('"value":0.002');
    expect(JSON.stringify(laws[0]?.expression)).toContain('"value":3000');
  });
});
