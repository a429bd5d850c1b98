import { newPlanMemory, planNotebook, type PlannableCell, readAhead } from '@stillroom/shared/plan';
import { describe, expect, test } from 'vitest';

const cell = (
  kind: PlannableCell['kind'],
  name: string,
  rest: Partial<PlannableCell> = {},
): PlannableCell => ({
  id: rest.id ?? `id-${name}`,
  kind,
  name,
  text: '',
  settings: {},
  ...rest,
});

const notebook = [
  cell('prose', '', { id: 'words', text: 'Ends at =[run1.species.P, last, 3 digits].' }),
  cell('network', 'enzyme', { text: 'E + S <=> ES -> E + P | 1, 2, 3\nstart E = 1, S = 10' }),
  cell('trajectory', 'run1', { settings: { network: 'enzyme', until: 50 } }),
  cell('plot', 'plot1', { settings: { draw: [{ cell: 'run1', x: 'times', y: ['species.P'] }] } }),
  cell('claim', 'claim1', { text: 'last(run1.species.P) > 9.5' }),
  cell('script', 'script1', { text: 'return run1.times.length', settings: { draws: ['run1'] } }),
];

const digests = (cells: readonly PlannableCell[]) =>
  Object.fromEntries(planNotebook(cells).cells.map(({ id, digest }) => [id, digest]));
const problemOf = (cells: readonly PlannableCell[], id: string) => planNotebook(cells).byId.get(id)?.problem;

describe('what draws on what', () => {
  test('names in settings, prose, claims and scripts become ids', () => {
    const plan = planNotebook(notebook);
    expect(Object.fromEntries(plan.cells.map(({ id, draws }) => [id, draws]))).toEqual({
      words: ['id-run1'],
      'id-enzyme': [],
      'id-run1': ['id-enzyme'],
      'id-plot1': ['id-run1'],
      'id-claim1': ['id-run1'],
      'id-script1': ['id-run1'],
    });
    expect(plan.cells.every(({ problem, digest }) => problem === null && digest?.startsWith('sha256:'))).toBe(
      true,
    );
  });

  test('each cell stands after what it draws on', () => {
    const { order, byId } = planNotebook(notebook);
    for (const [place, id] of order.entries()) {
      for (const drawn of byId.get(id)?.draws ?? []) expect(order.indexOf(drawn)).toBeLessThan(place);
    }
  });

  test('data of a Vega-Lite text are cells unless the text holds them', () => {
    const text = JSON.stringify({
      datasets: { own: [{ a: 1 }] },
      layer: [
        { data: { name: 'run1' }, mark: 'line' },
        { data: { name: 'own' }, mark: 'bar' },
      ],
    });
    const plan = planNotebook([...notebook, cell('plot', 'plot2', { text })]);
    expect(plan.byId.get('id-plot2')?.draws).toEqual(['id-run1']);
  });

  test('code and mathematics in prose draw on nothing', () => {
    const text =
      '`=[absent.x]` and $v =[absent, b]$ and \\=[absent]\n\n```\n=[absent.x]\n```\n~~~\n=[absent.y]';
    const plan = planNotebook([cell('prose', '', { id: 'p', text })]);
    expect(plan.byId.get('p')?.problem).toBeNull();
  });
});

describe('digests', () => {
  test('renaming a cell with all its uses changes no digest but that of texts that spell the name', () => {
    const renamed = JSON.parse(JSON.stringify(notebook).replaceAll('run1', 'course')) as PlannableCell[];
    const [before, after] = [digests(notebook), digests(renamed)];
    expect(after['id-course']).toBe(before['id-run1']);
    expect(after['id-plot1']).toBe(before['id-plot1']);
    expect(after['id-enzyme']).toBe(before['id-enzyme']);
  });

  test('a changed network changes everything downstream and nothing else', () => {
    const aside = cell('network', 'aside', { text: 'A -> B | 1' });
    const changed = [...notebook, aside].map((one) =>
      one.name === 'enzyme' ? { ...one, text: one.text.replace('3', '4') } : one,
    );
    const [before, after] = [digests([...notebook, aside]), digests(changed)];
    for (const id of ['words', 'id-enzyme', 'id-run1', 'id-plot1', 'id-claim1', 'id-script1']) {
      expect(after[id]).not.toBe(before[id]);
    }
    expect(after['id-aside']).toBe(before['id-aside']);
  });

  test('line ends, blanks at line ends and the form of accents do not count; order of settings neither', () => {
    const one = [cell('prose', '', { id: 'p', text: 'caf\u00e9 \nand tea' })];
    const two = [cell('prose', '', { id: 'p', text: 'cafe\u0301\r\nand tea\t' })];
    expect(digests(one)).toEqual(digests(two));
    const run = (settings: Record<string, unknown>) =>
      digests([notebook[1]!, cell('trajectory', 'run1', { settings })])['id-run1'];
    expect(run({ network: 'enzyme', until: 5 })).toBe(run({ until: 5, network: 'enzyme' }));
    expect(run({ network: 'enzyme', until: 5 })).not.toBe(run({ network: 'enzyme', until: 6 }));
  });

  test('a memory changes no plan', () => {
    const memory = newPlanMemory();
    planNotebook(notebook, memory);
    const edited = notebook.map((one) =>
      one.name === 'run1' ? { ...one, settings: { ...one.settings, until: 60 } } : one,
    );
    expect(planNotebook(edited, memory).cells).toEqual(planNotebook(edited).cells);
    expect(planNotebook(notebook, memory).cells).toEqual(planNotebook(notebook).cells);
  });

  test('a lone surrogate in a text is no reason to stop', () => {
    expect(
      planNotebook([cell('prose', '', { id: 'p', text: 'broken \ud83d half' })]).byId.get('p')?.digest,
    ).toMatch(/^sha256:[0-9a-f]{64}$/u);
  });
});

describe('what cannot be computed says why', () => {
  test('a name that nothing bears, at its place, with the nearest one', () => {
    const wrong = cell('claim', 'claim2', { text: '1 + 0 <\n  last(run.species.P)' });
    expect(problemOf([...notebook, wrong], 'id-claim2')).toEqual({
      message: 'There is no cell called run.',
      hint: 'Is run1 meant?',
      line: 2,
      column: 8,
    });
  });

  test('nothing chosen yet', () => {
    expect(problemOf([cell('structure', 's', { settings: { network: '' } })], 'id-s')?.message).toBe(
      'This structure has no network to draw on yet.',
    );
  });

  test('a cell of the wrong kind', () => {
    const wrong = cell('structure', 's', { settings: { network: 'run1' } });
    expect(problemOf([...notebook, wrong], 'id-s')?.message).toBe(
      'A structure draws on a network, and run1 is a trajectory.',
    );
  });

  test('two cells of one name, and what draws on them', () => {
    const twin = cell('network', 'enzyme', { id: 'twin', text: 'A -> B' });
    const cells = [...notebook, twin];
    expect(problemOf(cells, 'twin')?.message).toBe('Two cells are called enzyme.');
    expect(problemOf(cells, 'id-enzyme')?.message).toBe('Two cells are called enzyme.');
    expect(problemOf(cells, 'id-run1')?.message).toContain('it is not clear which is meant');
    expect(problemOf(cells, 'id-plot1')?.message).toBe('It draws on run1, which cannot be computed.');
  });

  test('a circle is spelt out on each of its cells, and what hangs on it is told', () => {
    const cells = [
      cell('script', 'a', { text: 'return b', settings: { draws: ['b'] } }),
      cell('script', 'b', { text: 'return c', settings: { draws: ['c'] } }),
      cell('script', 'c', { text: 'return a', settings: { draws: ['a'] } }),
      cell('script', 'd', { text: 'return a', settings: { draws: ['a'] } }),
      cell('script', 'e', { text: 'return e', settings: { draws: ['e'] } }),
    ];
    expect(problemOf(cells, 'id-b')?.message).toBe('b draws on c, which draws on a, which draws on b.');
    expect(problemOf(cells, 'id-d')?.message).toBe('It draws on a, which cannot be computed.');
    expect(problemOf(cells, 'id-e')?.message).toBe('e draws on itself.');
    expect(planNotebook(cells).order).toHaveLength(5);
  });

  test('a claim on a cell that cannot be computed keeps a digest: it is undecided', () => {
    const cells = [
      cell('structure', 's', { settings: { network: '' } }),
      cell('claim', 'c', { text: 's.x == 1' }),
    ];
    expect(problemOf(cells, 'id-c')).toBeNull();
  });

  test('settings that a kind does not know, or cannot use', () => {
    const run = (settings: Record<string, unknown>) =>
      problemOf(
        [notebook[1]!, cell('trajectory', 'r', { settings: { network: 'enzyme', ...settings } })],
        'id-r',
      );
    expect(run({ until: 5, untill: 6 })?.message).toBe('This trajectory has no setting called "untill".');
    expect(run({ until: -1 })?.message).toBe('This trajectory needs a number above 0 under "until", not -1.');
    expect(run({ until: 5, method: 'magic' })?.message).toContain('one of auto, stiff, nonstiff');
    expect(run({})?.message).toContain('needs until');
  });

  test('a name that cannot be one, and none at all', () => {
    expect(problemOf([cell('claim', '2x', { text: '1 == 1' })], 'id-2x')?.message).toContain(
      'cannot be the name',
    );
    expect(problemOf([cell('claim', '', { id: 'c', text: '1 == 1' })], 'c')?.message).toBe(
      'This claim has no name.',
    );
  });
});

describe('reading ahead', () => {
  const long = Array.from({ length: 3000 }, (_, i) => `A${i} + B <=> C${i} | p${i}, q${i} # row ${i}`).join(
    '\n',
  );

  test('changes no plan, whether it is finished, given up or followed by an edit', () => {
    for (const taken of [0, 1, Number.POSITIVE_INFINITY]) {
      const memory = newPlanMemory();
      let text = long;
      for (const edit of ['', '\nB -> 0', '\nB => 0']) {
        text += edit;
        const cells = [
          cell('network', 'large', { text }),
          cell('structure', 's', { settings: { network: 'large' } }),
        ];
        let steps = 0;
        for (const _step of readAhead(cells, memory)) if ((steps += 1) > taken) break;
        expect(planNotebook(cells, memory)).toEqual(planNotebook(cells));
      }
    }
  });
});
