/** How series differ without colour: dash and marker; with it: the six plot colours. */
export type Marker = 'disc' | 'square' | 'triangle' | 'diamond' | 'ring' | 'frame';

export interface SeriesStyle {
  readonly colour: string;
  readonly dash: string;
  readonly marker: Marker;
}

const styles: readonly SeriesStyle[] = [
  { colour: 'var(--plot1)', dash: '', marker: 'disc' },
  { colour: 'var(--plot2)', dash: '7 4', marker: 'square' },
  { colour: 'var(--plot3)', dash: '2 3.5', marker: 'triangle' },
  { colour: 'var(--plot4)', dash: '', marker: 'diamond' },
  { colour: 'var(--plot5)', dash: '11 4 2 4', marker: 'ring' },
  { colour: 'var(--plot6)', dash: '9 3 2 3 2 3', marker: 'frame' },
];

export const styleOf = (index: number): SeriesStyle => styles[index % styles.length] as SeriesStyle;

export interface Series {
  readonly name: string;
  readonly values: readonly (number | null)[];
}

/** Indices of about `most` points that keep the shape: the extremes of every stretch. */
export function thinned(values: readonly (number | null)[], most: number): readonly number[] {
  if (values.length <= most) return values.map((_, i) => i);
  const chosen = new Set<number>([0, values.length - 1]);
  const stretch = values.length / (most / 2);
  for (let begin = 0; begin < values.length; begin += stretch) {
    let low = Math.floor(begin);
    let high = low;
    for (let i = low; i < Math.min(values.length, begin + stretch); i++) {
      if ((values[i] ?? Infinity) < (values[low] ?? Infinity)) low = i;
      if ((values[i] ?? -Infinity) > (values[high] ?? -Infinity)) high = i;
    }
    chosen.add(low).add(high);
  }
  return [...chosen].sort((a, b) => a - b);
}

/** Keeps labels at least `apart` from each other within bounds, moving them as little as it must. */
export function spread(
  wanted: readonly number[],
  apart: number,
  top: number,
  bottom: number,
): readonly number[] {
  const order = wanted.map((at, i) => ({ at, i })).sort((a, b) => a.at - b.at);
  const placed = new Array<number>(wanted.length).fill(0);
  let last = -Infinity;
  for (const { at, i } of order) {
    last = Math.max(at, last + apart, top);
    placed[i] = last;
  }
  let limit = bottom;
  for (const { i } of [...order].reverse()) {
    placed[i] = Math.min(placed[i] ?? 0, limit);
    limit = (placed[i] ?? 0) - apart;
  }
  return placed;
}
