import { type CellJob, plotSettings } from '@stillroom/shared/cells';
import { parsePath, type PathStep, printPath, resolvePath, unitAt, unitText } from '@stillroom/shared/paths';
import type * as z from 'zod/mini';
import { CellFailure } from '../engine/failure.ts';
import { resultOf } from '../engine/inputs.ts';

type PlotSettings = z.infer<typeof plotSettings>;
type Spec = Readonly<Record<string, unknown>>;

interface Column {
  readonly values: readonly (number | string | null)[];
  readonly unit: string | null;
  /** Last name of its path. */
  readonly label: string;
}

export const vegaLiteSchema = 'https://vega.github.io/schema/vega-lite/v6.json';

/** Steps of a path within the result of `cell`; one that begins with the cell's own name counts from there. */
function stepsWithin(text: string, cell: string, result: unknown): readonly PathStep[] {
  const read = parsePath(text);
  if (!read.ok) {
    throw new CellFailure(`"${text}" is no path: ${read.misreading.message}`, {
      hint: 'Write a place in the result of the cell, such as times or species.P.',
    });
  }
  const { head, steps } = read.value;
  const whole = [head, ...steps];
  return head === cell && !resolvePath(result, { head, steps: whole.slice(0, 1) }).found ? steps : whole;
}

function columnAt(job: CellJob, cell: string, text: string): Column {
  const { input, result } = resultOf(job, cell);
  const steps = stepsWithin(text, cell, result);
  const found = resolvePath(result, { head: cell, steps });
  if (!found.found) throw new CellFailure(found.message, found.hint === null ? {} : { hint: found.hint });
  if (!Array.isArray(found.value)) {
    throw new CellFailure(`${printPath(cell, steps)} is no list, so it cannot be drawn.`);
  }
  const values = found.value.map((value: unknown) =>
    typeof value === 'number' || typeof value === 'string' ? value : null,
  );
  const last = steps.findLast((step) => typeof step === 'string');
  return { values, unit: unitAt(input.kind, result, steps), label: last ?? text };
}

/** Names of lines, told apart by their label, else by numbers: the names of cells are no part of a result. */
function distinct(labels: readonly string[]): string[] {
  const seen = new Map<string, number>();
  return labels.map((label) => {
    const count = (seen.get(label) ?? 0) + 1;
    seen.set(label, count);
    return labels.indexOf(label) === labels.lastIndexOf(label) ? label : `${label} (${count})`;
  });
}

function axisTitle(words: string | undefined, units: readonly (string | null)[], usual: string): string {
  if (words !== undefined && words !== '') return words;
  const known = [...new Set(units)];
  const unit = known.length === 1 ? known[0] : null;
  return unit === null || unit === undefined ? usual : `${usual} (${unitText(unit)})`.trim();
}

const marks: Readonly<Record<NonNullable<PlotSettings['mark']>, Spec>> = {
  line: { type: 'line', interpolate: 'linear' },
  point: { type: 'point', filled: true },
  area: { type: 'area', line: true, opacity: 0.4 },
  bar: { type: 'bar' },
};

/** A logarithmic axis has no place for what is not above 0; such points are left out and told. */
function drawable(value: number | string | null, scale: string | undefined): boolean {
  return value !== null && (scale !== 'log' || (typeof value === 'number' && value > 0));
}

/** The Vega-Lite specification of a filled-in form, with its data. */
export function formSpecification(job: CellJob): { spec: Spec; warnings: string[] } {
  const settings = plotSettings.parse(job.settings) as PlotSettings;
  const draw = settings.draw ?? [];
  if (draw.every(({ y }) => y.length === 0)) {
    throw new CellFailure('There is nothing to draw yet.', {
      hint: 'Choose a cell, what runs along, and what goes up.',
    });
  }
  const lines = draw.flatMap(({ cell, x, y, label }) => {
    const along = columnAt(job, cell, x);
    return y.map((path) => ({ along, up: columnAt(job, cell, path), label }));
  });
  const names = distinct(
    lines.map(({ up, label }) => (label === undefined ? up.label : `${label} ${up.label}`)),
  );
  let left = 0;
  const values = lines.flatMap(({ along, up }, index) =>
    up.values.flatMap((value, place) => {
      const x = along.values[place] ?? null;
      if (drawable(x, settings.x?.scale) && drawable(value, settings.y?.scale)) {
        return [{ x, y: value, series: names[index] ?? '' }];
      }
      left++;
      return [];
    }),
  );
  const along = lines.map((line) => line.along);
  const nominal = along.some((column) => column.values.some((value) => typeof value === 'string'));
  const type = (scale: string | undefined) => (scale === undefined ? {} : { scale: { type: scale } });
  const alongName = along[0]?.label === 'times' ? 'time' : (along[0]?.label ?? '');
  const description = settings.alternative ?? settings.caption;
  const spec = {
    $schema: vegaLiteSchema,
    ...(description === undefined || description === '' ? {} : { description }),
    width: 'container',
    data: { values },
    mark: marks[settings.mark ?? 'line'],
    encoding: {
      x: {
        field: 'x',
        type: nominal ? 'nominal' : 'quantitative',
        title: axisTitle(
          settings.x?.title,
          along.map(({ unit }) => unit),
          alongName,
        ),
        ...(nominal ? {} : type(settings.x?.scale)),
      },
      y: {
        field: 'y',
        type: 'quantitative',
        title: axisTitle(
          settings.y?.title,
          lines.map(({ up }) => up.unit),
          names.length === 1 ? (names[0] ?? '') : '',
        ),
        ...type(settings.y?.scale),
      },
      ...(names.length > 1
        ? {
            color: { field: 'series', type: 'nominal', sort: null, title: null },
            ...(settings.mark === undefined || settings.mark === 'line'
              ? { strokeDash: { field: 'series', type: 'nominal', sort: null, title: null } }
              : {}),
            ...(settings.mark === 'point'
              ? { shape: { field: 'series', type: 'nominal', sort: null, title: null } }
              : {}),
          }
        : {}),
    },
  };
  const warnings =
    left === 0
      ? []
      : [
          `${left} ${left === 1 ? 'point has' : 'points have'} no place in the picture and ${left === 1 ? 'is' : 'are'} left out.`,
        ];
  return { spec, warnings };
}
