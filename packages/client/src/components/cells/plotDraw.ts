import { plotMarks, plotSettings, type PlotMark } from '@stillroom/shared/cells';
import type { CellContent } from '@stillroom/shared/document';

/** One line of the plot's form: which cell, along what, up what. */
export interface Drawn {
  readonly cell: string;
  readonly x: string;
  readonly y: readonly string[];
  readonly label?: string | undefined;
}

/** What a plot draws; what its settings hold beside the form's own is left alone. */
export function drawnOf(settings: CellContent['settings']): readonly Drawn[] {
  const draw = plotSettings.safeParse({ draw: settings['draw'] });
  return draw.success ? (draw.data.draw ?? []) : [];
}

export const markOf = (settings: CellContent['settings']): PlotMark =>
  plotMarks.find((mark) => mark === settings['mark']) ?? 'line';

/** Indexed species need quotes in a path: run1.species["X[3]"]. */
const step = (name: string) => (/^[\p{L}_][\p{L}\p{N}_']*$/u.test(name) ? `.${name}` : `["${name}"]`);

/** Lists of numbers within a result, as paths: what can stand along or up. */
export function columnPaths(result: unknown): readonly string[] {
  const found: string[] = [];
  const numbers = (value: unknown): boolean =>
    Array.isArray(value) && value.length > 0 && value.every((one) => typeof one === 'number' || one === null);
  const walk = (value: unknown, path: string, depth: number): void => {
    if (found.length >= 300) return;
    if (numbers(value)) found.push(path);
    else if (typeof value === 'object' && value !== null && !Array.isArray(value) && depth < 3)
      for (const [key, inner] of Object.entries(value))
        walk(inner, path === '' ? key : `${path}${step(key)}`, depth + 1);
  };
  walk(result, '', 0);
  return found;
}
