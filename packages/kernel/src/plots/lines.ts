import type { CellJob, PlotSettings } from '@stillroom/shared/cells';
import { CellFailure } from '../engine/failure.ts';
import { type Column, columnAt } from './columns.ts';

/** One line, or set of points, of a plot. */
export interface PlotLine {
  readonly name: string;
  readonly along: Column;
  readonly up: Column;
}

/** Names told apart by numbers where they are alike: the names of cells are no part of a result. */
function distinct(names: readonly string[]): string[] {
  const seen = new Map<string, number>();
  return names.map((name) => {
    const count = (seen.get(name) ?? 0) + 1;
    seen.set(name, count);
    return names.indexOf(name) === names.lastIndexOf(name) ? name : `${name} (${count})`;
  });
}

/** What a filled-in form draws. @throws CellFailure where that is nothing, or a path leads nowhere */
export function plotLines(job: CellJob, { draw = [] }: PlotSettings): PlotLine[] {
  const lines = draw.flatMap(({ cell, x, y, label }) => {
    if (y.length === 0) return [];
    const along = columnAt(job, cell, x);
    return y.map((path) => {
      const up = columnAt(job, cell, path);
      return { along, up, name: label === undefined ? up.label : `${label} ${up.label}` };
    });
  });
  if (lines.length === 0) {
    throw new CellFailure('There is nothing to draw yet.', {
      hint: 'Choose a cell, what runs along, and what goes up.',
    });
  }
  const names = distinct(lines.map(({ name }) => name));
  return lines.map((line, index) => ({ ...line, name: names[index] ?? line.name }));
}

/** A point as the specification holds it. */
export interface PlotPoint {
  readonly x: number | string;
  readonly y: number | string;
  readonly series: string;
}

/** A logarithmic axis has no place for what is not above 0. */
function drawable(value: number | string | null, scale: string | undefined): value is number | string {
  return value !== null && (scale !== 'log' || (typeof value === 'number' && value > 0));
}

/** The points of all lines, and how many have no place in the picture. */
export function plotPoints(
  lines: readonly PlotLine[],
  settings: PlotSettings,
): { readonly points: PlotPoint[]; readonly left: number } {
  let left = 0;
  const points = lines.flatMap(({ along, up, name }) =>
    up.values.flatMap((y, place) => {
      const x = along.values[place] ?? null;
      if (drawable(x, settings.x?.scale) && drawable(y, settings.y?.scale)) return [{ x, y, series: name }];
      left++;
      return [];
    }),
  );
  return { points, left };
}
