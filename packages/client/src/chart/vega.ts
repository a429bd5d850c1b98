import type { VisualizationSpec } from 'vega-embed';

/** A drawn plot; `destroy` frees it. */
export interface DrawnPlot {
  destroy(): void;
}

const token = (name: string) => getComputedStyle(document.documentElement).getPropertyValue(name).trim();

/** The page's own look for plots whose specification does not say otherwise. */
function pageLook(): Record<string, unknown> {
  const [ink, ink2, rule] = [token('--ink'), token('--ink2'), token('--rule')];
  const sans = 'Alegreya Sans, Gill Sans, sans-serif';
  return {
    background: 'transparent',
    font: sans,
    view: { stroke: null },
    axis: {
      labelFont: sans,
      titleFont: sans,
      labelFontSize: 13.5,
      titleFontSize: 13.5,
      titleFontWeight: 'normal',
      labelColor: ink2,
      titleColor: ink2,
      domainColor: ink,
      domainWidth: 1.2,
      tickColor: ink,
      gridColor: rule,
      labelOverlap: 'greedy',
      labelFlush: false,
      tickCount: 5,
    },
    axisX: { grid: false },
    numberFormat: '.6~g',
    legend: { labelFont: sans, titleFont: sans, labelFontSize: 13.5, labelColor: ink2, titleColor: ink2 },
    header: { labelFont: sans, labelFontSize: 14.5, labelFontWeight: 500, labelColor: ink },
    title: { font: sans, fontSize: 15, color: ink, anchor: 'start' },
    text: { font: sans, fontSize: 13.5, color: ink },
    line: { strokeWidth: 2.2 },
    range: {
      category: [1, 2, 3, 4, 5, 6].map((i) => token(`--plot${i}`)),
      ramp: [token('--paper'), token('--plot1'), ink],
    },
  };
}

/** A record must show the same for ever: nothing outside the specification is fetched. */
const refuse = () => Promise.reject(new Error('A plot may not load anything from elsewhere.'));

/** Where small pictures side by side would be smaller than they can be read, they stand one below the other. */
function fitted(spec: Readonly<Record<string, unknown>>, width: number): Readonly<Record<string, unknown>> {
  const { columns, spec: inner } = spec;
  const isNarrow = 'facet' in spec && typeof columns === 'number' && columns > 1 && width > 0 && width < 480;
  if (!isNarrow || typeof inner !== 'object' || inner === null) return spec;
  return { ...spec, columns: 1, spec: { ...inner, width: Math.max(180, width - 70) } };
}

/**
 * Draws a Vega-Lite specification into an element. Expressions are interpreted, never compiled, so that the content
 * policy holds; data are part of the specification, so nothing is loaded.
 */
export async function drawPlot(
  place: HTMLElement,
  spec: Readonly<Record<string, unknown>>,
  description: string | null,
): Promise<DrawnPlot> {
  const [{ default: embed }, { expressionInterpreter }] = await Promise.all([
    import('vega-embed'),
    import('vega-interpreter'),
  ]);
  const single = 'mark' in spec || 'layer' in spec;
  const sized = {
    ...(single ? { width: 'container', height: 260, autosize: { type: 'fit', contains: 'padding' } } : {}),
    ...spec,
    ...(description === null ? {} : { description }),
  };
  const drawn = await embed(place, fitted(sized, place.clientWidth) as unknown as VisualizationSpec, {
    ast: true,
    expr: expressionInterpreter,
    actions: false,
    defaultStyle: false,
    tooltip: { disableDefaultStyle: true },
    renderer: 'svg',
    config: pageLook(),
    loader: { load: refuse, sanitize: refuse, http: refuse, file: refuse },
  });
  return { destroy: () => drawn.finalize() };
}
