/** Ways to make one number of a list. */
export type Reduction = 'first' | 'last' | 'mean' | 'sd' | 'min' | 'max' | 'sum';

/**
 * Makes one number of a list, in the order of the list, so that bytes do not depend on who computes. `sd` is the root of
 * the unbiased variance (0 for a single entry), by the corrected two-pass formula (Chan, Golub, LeVeque 1983).
 *
 * @param values at least one
 */
export function reduceNumbers(how: Reduction, values: readonly number[]): number {
  const first = values[0] ?? Number.NaN;
  switch (how) {
    case 'first':
      return first;
    case 'last':
      return values.at(-1) ?? first;
    case 'min':
      return values.reduce((least, value) => (value < least ? value : least), first);
    case 'max':
      return values.reduce((most, value) => (value > most ? value : most), first);
    case 'sum':
      return values.reduce((sum, value) => sum + value, 0);
    case 'mean':
      return reduceNumbers('sum', values) / values.length;
    case 'sd': {
      if (values.length < 2) return 0;
      const mean = reduceNumbers('mean', values);
      let squares = 0;
      let drift = 0;
      for (const value of values) {
        const away = value - mean;
        squares += away * away;
        drift += away;
      }
      return Math.sqrt(Math.max(0, squares - (drift * drift) / values.length) / (values.length - 1));
    }
  }
}

/**
 * A course at a time: its value where the time is one of its points, in between by the straight line between neighbours;
 * null outside.
 *
 * @param times ascending, as many as values
 */
export function valueAt(times: readonly number[], values: readonly number[], time: number): number | null {
  const next = times.findIndex((point) => point >= time);
  const right = times[next];
  const value = values[next];
  if (right === undefined || value === undefined) return null;
  if (right === time) return value;
  const left = times[next - 1];
  const before = values[next - 1];
  if (left === undefined || before === undefined) return null;
  return before + ((value - before) * (time - left)) / (right - left);
}
