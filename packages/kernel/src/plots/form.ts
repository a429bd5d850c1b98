import {
  type CellJob,
  type PlotFacet,
  type PlotMark,
  type PlotSettings,
  plotSettings,
} from '@stillroom/shared/cells';
import { unitText } from '@stillroom/shared/paths';
import { type PlotLine, plotLines, plotPoints } from './lines.ts';

type Spec = Readonly<Record<string, unknown>>;

export const vegaLiteSchema = 'https://vega.github.io/schema/vega-lite/v6.json';

const marks: Readonly<Record<PlotMark, Spec>> = {
  line: { type: 'line', interpolate: 'linear' },
  point: { type: 'point', filled: true },
  area: { type: 'area', line: true, opacity: 0.4 },
  bar: { type: 'bar' },
};

/** What tells several lines apart besides colour, for those who do not see it. */
const secondChannel: Partial<Record<PlotMark, string>> = { line: 'strokeDash', point: 'shape' };

/** The author's words, else what the axis shows with the unit that all its lists share. */
function axisTitle(words: string | undefined, units: readonly (string | null)[], usual: string): string {
  if (words !== undefined && words !== '') return words;
  const [unit = null, ...others] = [...new Set(units)];
  if (unit === null || others.length > 0) return usual;
  return usual === '' ? unitText(unit) : `${usual} (${unitText(unit)})`;
}

const scaleOf = (scale: string | undefined): Spec => (scale === undefined ? {} : { scale: { type: scale } });

function alongChannel(lines: readonly PlotLine[], axis: PlotSettings['x']): Spec {
  const nominal = lines.some(({ along }) => along.values.some((value) => typeof value === 'string'));
  const label = lines[0]?.along.label ?? '';
  const units = lines.map(({ along }) => along.unit);
  return {
    field: 'x',
    type: nominal ? 'nominal' : 'quantitative',
    title: axisTitle(axis?.title, units, label === 'times' ? 'time' : label),
    ...(nominal ? {} : scaleOf(axis?.scale)),
  };
}

function upChannel(lines: readonly PlotLine[], axis: PlotSettings['y']): Spec {
  const [only, another] = lines;
  const units = lines.map(({ up }) => up.unit);
  return {
    field: 'y',
    type: 'quantitative',
    title: axisTitle(axis?.title, units, another === undefined ? (only?.name ?? '') : ''),
    ...scaleOf(axis?.scale),
  };
}

function seriesChannels(lines: readonly PlotLine[], mark: PlotMark, by: PlotFacet | undefined): Spec {
  if (by === 'line' || new Set(lines.map(({ name }) => name)).size < 2) return {};
  const series = { field: 'series', type: 'nominal', sort: null, title: null };
  const second = secondChannel[mark];
  return { color: series, ...(second === undefined ? {} : { [second]: series }) };
}

function leftOut(count: number): string[] {
  if (count === 0) return [];
  return count === 1
    ? ['1 point has no place in the picture and is left out.']
    : [`${count} points have no place in the picture and are left out.`];
}

/** Width of all small pictures of a line together, and the height of each, in pixels. */
const facetSizes = { together: 600, margin: 44, height: 190 };
const mostBeside = 3;

/** One picture, as wide as its place, or a small one for each panel: up to three side by side. */
function arranged(
  lines: readonly PlotLine[],
  facets: PlotSettings['facets'],
  picture: Spec,
): { readonly [key: string]: unknown } {
  if (facets === undefined) return { width: 'container', ...picture };
  const { data, ...inner } = picture;
  const panels = [...new Set(lines.flatMap(({ panel }) => panel ?? []))];
  const columns = Math.max(1, Math.min(mostBeside, panels.length));
  return {
    data,
    facet: { field: 'panel', type: 'nominal', sort: panels, title: null, header: { labelAnchor: 'start' } },
    columns,
    spec: {
      width: Math.floor(facetSizes.together / columns) - facetSizes.margin,
      height: facetSizes.height,
      ...inner,
    },
    ...(facets.sameAxes === false ? { resolve: { scale: { x: 'independent', y: 'independent' } } } : {}),
  };
}

/**
 * The Vega-Lite specification of a filled-in form, with its data, and what was left out in words.
 *
 * @throws CellFailure where there is nothing to draw, or a path leads nowhere
 */
export function formSpecification(job: CellJob): { spec: Spec; warnings: string[] } {
  const settings = plotSettings.parse(job.settings) as PlotSettings;
  const lines = plotLines(job, settings);
  const { points, left } = plotPoints(lines, settings);
  const mark = settings.mark ?? 'line';
  const description = settings.alternative ?? settings.caption ?? '';
  const spec = {
    $schema: vegaLiteSchema,
    ...(description === '' ? {} : { description }),
    ...arranged(lines, settings.facets, {
      data: { values: points },
      mark: marks[mark],
      encoding: {
        x: alongChannel(lines, settings.x),
        y: upChannel(lines, settings.y),
        ...seriesChannels(lines, mark, settings.facets?.by),
      },
    }),
  };
  return { spec, warnings: leftOut(left) };
}
