import type { PlotResult } from '@stillroom/shared/cells';
import { evaluateCell } from '@stillroom/kernel/engine';
import { describe, expect, test } from 'vitest';
import { compile } from 'vega-lite';
import { course, drawn, errorOf, jobOf, resultOf } from '../../support/cell-jobs.ts';

const inputs = { run1: drawn('trajectory', course), run2: drawn('trajectory', course) };
const form = (settings: Record<string, unknown>) => jobOf('plot', '', inputs, settings);
const text = (spec: unknown) => jobOf('plot', typeof spec === 'string' ? spec : JSON.stringify(spec), inputs);

interface Spec {
  data: { values: { x: number; y: number; series: string }[] };
  encoding: Record<string, { title: string | null; scale?: unknown }>;
  datasets: Record<string, Record<string, unknown>[]>;
}
const specOf = (job: ReturnType<typeof form>) => resultOf<PlotResult>(job).spec as unknown as Spec;

describe('from the form', () => {
  test('a line for each path, with units from the course', () => {
    const spec = specOf(
      form({ draw: [{ cell: 'run1', x: 'times', y: ['species.P', 'species["X[3]"]'] }], mark: 'line' }),
    );
    expect(spec.data.values).toHaveLength(8);
    expect(spec.data.values[3]).toEqual({ x: 4, y: 9.8765, series: 'P' });
    expect(spec.encoding['x']?.title).toBe('time (s)');
    expect(spec.encoding['y']?.title).toBe('µM');
  });

  test('two courses are told apart by labels or numbers, never by the names of cells', () => {
    const draw = [
      { cell: 'run1', x: 'times', y: ['species.P'] },
      { cell: 'run2', x: 'run2.times', y: ['run2.species.P'] },
    ];
    const series = new Set(specOf(form({ draw })).data.values.map((row) => row.series));
    expect([...series]).toEqual(['P (1)', 'P (2)']);
    const labelled = [{ ...draw[0], label: 'cold' }, draw[1]];
    expect(new Set(specOf(form({ draw: labelled })).data.values.map((row) => row.series))).toEqual(
      new Set(['cold P', 'P']),
    );
  });

  test('small pictures side by side, one for each cell, share the names of their lines', () => {
    const spec = specOf(
      form({
        draw: [
          { cell: 'run1', x: 'times', y: ['species.P'], label: 'cold' },
          { cell: 'run2', x: 'times', y: ['species.P'] },
        ],
        facets: { by: 'cell' },
      }),
    ) as unknown as { data: Spec['data']; facet: unknown; columns: number; spec: Spec; resolve?: unknown };
    expect(spec).toMatchObject({ facet: { field: 'panel', sort: ['cold', '2'] }, columns: 2 });
    expect(spec.resolve).toBeUndefined();
    const rows = spec.data.values as unknown as { series: string; panel: string }[];
    expect(new Set(rows.map(({ panel, series }) => `${panel}: ${series}`))).toEqual(
      new Set(['cold: P', '2: P']),
    );
    expect(spec.spec.encoding['color']).toBeUndefined();
  });

  test('one for each line, each on axes of its own', () => {
    const spec = specOf(
      form({
        draw: [{ cell: 'run1', x: 'times', y: ['species.P', 'species["X[3]"]'] }],
        facets: { by: 'line', sameAxes: false },
      }),
    ) as unknown as { data: Spec['data']; resolve: unknown; width?: unknown };
    const rows = spec.data.values as unknown as { panel: string }[];
    expect(new Set(rows.map(({ panel }) => panel))).toEqual(new Set(['P', 'X[3]']));
    expect(spec.resolve).toEqual({ scale: { x: 'independent', y: 'independent' } });
    expect(spec.width).toBeUndefined();
  });

  test('what a logarithmic axis cannot show is left out and told', () => {
    const job = form({ draw: [{ cell: 'run1', x: 'times', y: ['species.P'] }], y: { scale: 'log' } });
    expect(evaluateCell(job, { checkpoint: () => undefined }).warnings).toEqual([
      '1 point has no place in the picture and is left out.',
    ]);
  });

  test('points without a value are left out', () => {
    expect(
      specOf(form({ draw: [{ cell: 'run1', x: 'times', y: ['derived.ratio'] }] })).data.values,
    ).toHaveLength(3);
  });

  test.each([
    [{}, 'nothing to draw yet'],
    [{ draw: [{ cell: 'run1', x: 'times', y: ['species.Q'] }] }, 'run1.species has no Q.'],
    [{ draw: [{ cell: 'run1', x: 'ended', y: ['species.P'] }] }, 'run1.ended is no list'],
    [{ draw: [{ cell: 'run1', x: 'times', y: ['species..P'] }] }, 'is no path'],
  ])('%j is an error', (settings, words) => expect(errorOf(form(settings)).message).toContain(words));

  test('the specification is one that Vega-Lite compiles without a warning', () => {
    const warnings: unknown[] = [];
    const logger = {
      level: () => logger,
      error: () => logger,
      warn: (...words: unknown[]) => (warnings.push(words), logger),
      info: () => logger,
      debug: () => logger,
    };
    const spec = specOf(
      form({
        draw: [{ cell: 'run1', x: 'times', y: ['species.P', 'derived.ratio'] }],
        mark: 'point',
        x: { title: 'Time', scale: 'sqrt' },
        caption: 'One',
        alternative: 'A rising line',
      }),
    );
    compile(spec as never, { logger: logger as never });
    expect(warnings).toEqual([]);
  });
});

describe('from a text', () => {
  const line = { mark: 'line', encoding: { x: { field: 't' }, y: { field: 'P' } } };

  test('data named like a cell are its table', () => {
    const { datasets } = specOf(text({ data: { name: 'run1' }, ...line }));
    expect(datasets['run1']?.[3]).toEqual({ t: 4, P: 9.8765, 'X[3]': 1, ratio: null });
  });

  test.each([
    [{ data: { url: 'https://elsewhere.example/x.csv' }, ...line }, 'not from an address'],
    [{ layer: [{ data: { name: 'run1', url: '/x' }, ...line }] }, 'not from an address'],
    [
      { transform: [{ lookup: 'a', from: { data: { url: '/x' }, key: 'a' } }], data: { name: 'run1' } },
      'not from an address',
    ],
    [{ data: { name: 'run1' }, mark: { type: 'image' } }, 'cannot show images'],
    [{ data: { name: 'nobody' }, ...line }, 'no cell called nobody'],
    [{ $schema: 'https://vega.github.io/schema/vega/v6.json', ...line }, 'not for Vega-Lite 6'],
    ['{"mark": "line",}', 'a key in double quotes'],
    ['[1]', 'an object in braces'],
  ])('%j is refused', (spec, words) => expect(errorOf(text(spec)).message).toContain(words));

  test('a slip in the JSON is told by line and column', () => {
    expect(errorOf(text('{\n  "mark": line\n}'))).toMatchObject({ line: 2, column: 11 });
  });
});
