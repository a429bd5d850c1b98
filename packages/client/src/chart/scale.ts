/** A linear scale from a domain to pixels. */
export interface Scale {
  readonly from: number;
  readonly to: number;
  (value: number): number;
}

export function linearScale(domain: readonly [number, number], range: readonly [number, number]): Scale {
  const [a, b] = domain;
  const [p, q] = range;
  const at = (value: number) => (b === a ? (p + q) / 2 : p + ((q - p) * (value - a)) / (b - a));
  return Object.assign(at, { from: a, to: b });
}

/** Steps that read well: 1, 2, 2.5 or 5 times a power of ten; for time in minutes or seconds 6 as well. */
function step(span: number, count: number, sixes: boolean): number {
  const rough = span / Math.max(1, count);
  const power = 10 ** Math.floor(Math.log10(rough));
  const choices = sixes ? [1, 2, 3, 6, 10] : [1, 2, 2.5, 5, 10];
  return power * (choices.find((choice) => choice * power >= rough * 0.999) ?? 10);
}

/** Values for ticks within a domain, about `count` of them. */
export function ticks(from: number, to: number, count: number, sixes = false): readonly number[] {
  if (!(to > from)) return [from];
  const by = step(to - from, count, sixes);
  const first = Math.ceil(from / by - 1e-9);
  const last = Math.floor(to / by + 1e-9);
  return Array.from({ length: last - first + 1 }, (_, i) => Number(((first + i) * by).toPrecision(12)));
}

/** A domain widened to whole ticks, from zero where all values are on one side of it. */
export function niceDomain(low: number, high: number, count: number): readonly [number, number] {
  const from = low >= 0 && low < high * 0.6 ? 0 : low;
  const to = high === from ? from + 1 : high;
  const by = step(to - from, count, false);
  return [Math.floor(from / by + 1e-9) * by, Math.ceil(to / by - 1e-9) * by];
}
