import { parsePath, printPath, resolvePath, unitAt } from '@stillroom/shared/paths';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';

const read = (text: string) => {
  const path = parsePath(text);
  if (!path.ok) throw new Error(path.misreading.message);
  return path.value;
};

describe('reading', () => {
  test.each([
    ['run1', 'run1', []],
    ['run1.species.P', 'run1', ['species', 'P']],
    ['run1.species["X[3]"]', 'run1', ['species', 'X[3]']],
    ["run1.species.S'", 'run1', ['species', "S'"]],
    ['shape.complexes[0].of.E', 'shape', ['complexes', 0, 'of', 'E']],
    ['läufe.species.α', 'läufe', ['species', 'α']],
  ])('%s', (text, head, steps) => {
    expect(read(text)).toMatchObject({ head, steps });
  });

  test.each([
    ['', 'name of a cell'],
    ['1run', 'name of a cell'],
    ['run1.', 'name is missing after the dot'],
    ['run1[', 'In brackets stands a number'],
    ['run1[x]', 'In brackets stands a number'],
    ['run1["x]', 'In brackets stands a number'],
    ['run1["\\q"]', 'is not a quoted name'],
    ['run1 and', 'does not belong to a path'],
  ])('%s is refused', (text, words) => {
    const path = parsePath(text);
    expect(path.ok ? '' : path.misreading.message).toContain(words);
  });

  test('accents in either form name the same', () => {
    expect(read('cafe\u0301.x').head).toBe('caf\u00e9');
  });
});

test('printing and reading are inverse', () => {
  const step = fc.oneof(
    fc.nat({ max: 1e6 }),
    fc.string().map((text) => text.normalize('NFC')),
  );
  fc.assert(
    fc.property(fc.array(step, { maxLength: 6 }), (steps) => {
      const well = steps.filter((one) => typeof one === 'number' || !/\p{Surrogate}/u.test(one));
      expect(read(printPath('run1', well)).steps).toEqual(well);
    }),
    { seed: 20261201 },
  );
});

describe('following', () => {
  const result = {
    species: { P: [1, 2], 'X[3]': [3] },
    units: { time: 's', amount: 'uM', volume: null },
    rank: null,
  };
  const follow = (text: string) => resolvePath(result, read(text));

  test('finds own members and entries', () => {
    expect(follow('run1.species["X[3]"][0]')).toEqual({ found: true, value: 3 });
    expect(follow('run1')).toEqual({ found: true, value: result });
  });

  test.each([
    ['run1.species.Q', 'run1.species has no Q.', 'It has P, X[3].'],
    [
      'run1.species.X',
      'run1.species has no X.',
      'An indexed name is written in quotes: run1.species["X[3]"].',
    ],
    ['run1.species.P[2]', 'run1.species.P has 2 entries, so there is no [2].', 'Entries are counted from 0.'],
    [
      'run1.species.P.last',
      'run1.species.P is a list, so it has no last.',
      'Write run1.species.P[0] for its first entry.',
    ],
    ['run1.species.P[0].x', 'run1.species.P[0] is a single value, so it has no x.', null],
    ['run1.rank.x', 'run1.rank is undecided, so it has no x.', null],
    ['run1.constructor', 'run1 has no constructor.', 'It has species, units, rank.'],
    [
      'run1.species.P.length',
      'run1.species.P is a list, so it has no length.',
      'Write run1.species.P[0] for its first entry.',
    ],
  ])('%s', (text, message, hint) => expect(follow(text)).toEqual({ found: false, message, hint }));

  test('units go with the place', () => {
    expect(unitAt('trajectory', result, ['species', 'P'])).toBe('uM');
    expect(unitAt('trajectory', result, ['times'])).toBe('s');
    expect(unitAt('trajectory', result, ['statistics', 'steps'])).toBeNull();
    expect(unitAt('structure', result, ['species'])).toBeNull();
    expect(unitAt('network', { constants: [{ unit: '/s' }] }, ['constants', 0, 'value'])).toBe('/s');
    expect(unitAt('trajectory', { units: null }, ['times'])).toBeNull();
  });
});
