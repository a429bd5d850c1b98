import { type CellKind, cellRegistry, type TrajectoryResult } from '@stillroom/shared/cells';
import type { CellContent } from '@stillroom/shared/document';
import { readNetwork } from '@stillroom/shared/notation';
import { tellingLines } from '../chart/chosenSeries.ts';
import type { Cells } from './useCells.ts';

/** The result a cell shows, where this page has it. */
export type ResultOf = (id: string) => unknown;

/** The nearest cell of a kind at or before a place (null: the beginning), else the first of all. */
function nearest(kind: CellKind, after: string | null, cells: Cells): CellContent | undefined {
  const order = cells.order.value;
  const before = order.slice(0, after === null ? 0 : order.indexOf(after) + 1).reverse();
  const id = [...before, ...order].find((one) => cells.byId.get(one)?.kind === kind);
  return id === undefined ? undefined : cells.byId.get(id);
}

/** Indexed species need quotes in a path. */
const speciesPath = (name: string) =>
  /^[\p{L}_][\p{L}\p{N}_]*$/u.test(name) ? `species.${name}` : `species["${name}"]`;

/** Lines drawn at first where a course has no result yet to choose by. */
const firstLines = 6;

/** The lines worth drawing: by what they do where the course is known, else the first that its network names. */
function linesOf(course: CellContent, cells: Cells, resultOf: ResultOf): readonly string[] {
  const result = resultOf(course.id) as Partial<TrajectoryResult> | undefined;
  if (result?.species !== undefined)
    return tellingLines(Object.entries(result.species).map(([name, values]) => ({ name, values })));
  const network = [...cells.byId.values()].find(
    ({ kind, name }) => kind === 'network' && name === course.settings['network'],
  );
  return readNetwork(network?.text ?? '').network?.species.slice(0, firstLines) ?? [];
}

function plotOf(course: CellContent | undefined, cells: Cells, resultOf: ResultOf): CellContent['settings'] {
  if (course === undefined) return {};
  const y = linesOf(course, cells, resultOf).map(speciesPath);
  return { draw: [{ cell: course.name, x: 'times', y }] };
}

/** The settings of a new cell: it draws on what stands nearest before it where its kind needs something. */
export function newCellSettings(
  kind: CellKind,
  after: string | null,
  cells: Cells,
  resultOf: ResultOf,
): CellContent['settings'] {
  const settings = cellRegistry[kind].empty.settings;
  if (kind === 'plot')
    return { ...settings, ...plotOf(nearest('trajectory', after, cells), cells, resultOf) };
  if (settings['network'] !== '') return settings;
  return { ...settings, network: nearest('network', after, cells)?.name ?? '' };
}
