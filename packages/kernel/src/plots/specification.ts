import type { CellJob } from '@stillroom/shared/cells';
import { readJson } from '@stillroom/shared/json';
import { lineAndColumn } from '@stillroom/shared/paths';
import { CellFailure } from '../engine/failure.ts';
import { resultOf } from '../engine/inputs.ts';
import { vegaLiteSchema } from './form.ts';
import { type PlotRow, plotTable } from './table.ts';

type Spec = Readonly<Record<string, unknown>>;

const isRecord = (value: unknown): value is Spec =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

/** Generators and transforms that a picture may not draw its data from. */
const fetching = ['url'] as const;

/** Walks a specification; refuses data from elsewhere and collects the names of data. */
function dataNames(text: string, spec: Spec): Set<string> {
  const own = new Set(isRecord(spec['datasets']) ? Object.keys(spec['datasets']) : []);
  const names = new Set<string>();
  const walk = (value: unknown, key: string | null): void => {
    if (Array.isArray(value)) return value.forEach((entry) => walk(entry, null));
    if (!isRecord(value)) return;
    if (key === 'datasets') return;
    if (key === 'data') {
      if (fetching.some((from) => Object.hasOwn(value, from))) {
        throw new CellFailure('A picture takes its data from cells, not from an address.', {
          ...lineAndColumn(text, Math.max(0, text.indexOf('"url"'))),
          hint: 'Write "data": { "name": "run1" } with the name of a cell.',
        });
      }
      const name = value['name'];
      if (typeof name === 'string' && !own.has(name) && !Object.hasOwn(value, 'values')) names.add(name);
    }
    if (value['type'] === 'image' || value['mark'] === 'image') {
      throw new CellFailure('A picture cannot show images from an address.', { hint: 'Use another mark.' });
    }
    for (const [inner, member] of Object.entries(value)) walk(member, inner);
  };
  walk(spec, null);
  return names;
}

/** The specification that the text of a plot holds, with the tables of the cells it names. */
export function textSpecification(job: CellJob): Spec {
  const json = readJson(job.text);
  if (!json.ok) {
    throw new CellFailure(json.message, {
      line: json.line,
      column: json.column,
      hint: 'The text of a plot is a Vega-Lite specification in JSON.',
    });
  }
  if (!isRecord(json.value)) throw new CellFailure('A Vega-Lite specification is an object in braces.');
  const spec = json.value;
  const schema = spec['$schema'];
  if (
    schema !== undefined &&
    (typeof schema !== 'string' || !/vega-lite\/v6(?:\.[\d.]+)?\.json$/u.test(schema))
  ) {
    throw new CellFailure('The specification is not for Vega-Lite 6.', {
      hint: `Its "$schema" is ${vegaLiteSchema}`,
    });
  }
  const tables: Record<string, readonly PlotRow[]> = {};
  for (const name of dataNames(job.text, spec)) {
    const { input, result } = resultOf(job, name.normalize('NFC'));
    tables[name] = plotTable(input.kind, result, name);
  }
  const datasets = isRecord(spec['datasets']) ? spec['datasets'] : {};
  return { $schema: vegaLiteSchema, ...spec, datasets: { ...datasets, ...tables } };
}
