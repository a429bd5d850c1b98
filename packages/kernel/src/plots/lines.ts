import type { CellJob, PlotSettings } from '@stillroom/shared/cells';
import { CellFailure } from '../engine/failure.ts';
import { type Column, columnAt } from './columns.ts';

/** One line, or set of points, of a plot. */
export interface PlotLine {
  readonly name: string;
  readonly along: Column;
  readonly up: Column;
  /** Heading of the small picture it stands in; null where all stand in one. */
  readonly panel: string | null;
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
export function plotLines(job: CellJob, { draw = [], facets }: PlotSettings): PlotLine[] {
  const drawn = draw.filter(({ y }) => y.length > 0);
  const lines = drawn.flatMap(({ cell, x, y, label }, part) => {
    const along = columnAt(job, cell, x);
    const apart = facets?.by === 'cell';
    // Where the author gives no name it is a number: the names of cells are no part of a result.
    const panel = apart ? (label ?? String(part + 1)) : null;
    return y.map((path) => {
      const up = columnAt(job, cell, path);
      return { along, up, panel, name: label === undefined || apart ? up.label : `${label} ${up.label}` };
    });
  });
  if (lines.length === 0) {
    throw new CellFailure('There is nothing to draw yet.', {
      hint: 'Choose a cell, what runs along, and what goes up.',
    });
  }
  // The same species in two pictures is one line by name, colour and dash.
  if (facets?.by === 'cell') return lines;
  const names = distinct(lines.map(({ name }) => name));
  return lines.map((line, index) => {
    const name = names[index] ?? line.name;
    return { ...line, name, panel: facets?.by === 'line' ? name : null };
  });
}

/** A point as the specification holds it. */
export interface PlotPoint {
  readonly x: number | string;
  readonly y: number | string;
  readonly series: string;
  readonly panel?: string;
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
  const points = lines.flatMap(({ along, up, name, panel }) =>
    up.values.flatMap((y, place) => {
      const x = along.values[place] ?? null;
      if (drawable(x, settings.x?.scale) && drawable(y, settings.y?.scale))
        return [{ x, y, series: name, ...(panel === null ? {} : { panel }) }];
      left++;
      return [];
    }),
  );
  return { points, left };
}
