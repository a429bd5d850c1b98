import type { TriedKind } from '../../composables/useTrial.ts';
import type { NetworkResult } from '../results/shapes.ts';

/** One value that may be tried: the cell's own stands at the middle of its slider. */
export interface Tryable {
  readonly kind: TriedKind;
  readonly name: string;
  /** What it belongs to, in the author's words: the note of its row, or "start". */
  readonly of: string;
  /** Positive. */
  readonly own: number;
  readonly unit: string | null;
}

/** Steps of a slider to either side of the cell's own value, over a factor of ten. */
export const sliderSteps = 100;

/** The value at a step of a slider, to three digits; the middle is the cell's own exactly. */
export const valueAt = (own: number, step: number): number =>
  step === 0 ? own : Number((own * 10 ** (step / sliderSteps)).toPrecision(3));

/** The step nearest to a value; the ends for what lies beyond. */
export function stepOf(own: number, value: number): number {
  if (value <= 0) return -sliderSteps;
  const step = Math.round(Math.log10(value / own) * sliderSteps);
  return Math.min(sliderSteps, Math.max(-sliderSteps, step));
}

const isPositive = (value: unknown): value is number => typeof value === 'number' && value > 0;
const given = (settings: Readonly<Record<string, unknown>>, kind: TriedKind): Record<string, unknown> => {
  const own = settings[kind];
  return typeof own === 'object' && own !== null ? (own as Record<string, unknown>) : {};
};

/**
 * The values that may be tried in a cell: positive constants of its network, then, where the cell begins somewhere, positive
 * starts; those its own settings put in their place count as its own. `rowNotes` are those of the network's rows.
 */
export function tryables(
  network: Pick<NetworkResult, 'constants' | 'start' | 'reactions' | 'units'>,
  settings: Readonly<Record<string, unknown>>,
  kinds: readonly TriedKind[],
  rowNotes: readonly string[],
): readonly Tryable[] {
  const notes = new Map<string, string>();
  for (const { rate, row } of network.reactions) {
    const note = rowNotes[row] ?? '';
    for (const [name] of rate.matchAll(/[\p{L}][\p{L}\p{N}_']*(?:\[[^\]]*\])?/gu))
      if (note !== '' && !notes.has(name)) notes.set(name, note);
  }
  const constants = network.constants.flatMap(({ name, value, unit }): Tryable[] => {
    const own = given(settings, 'constants')[name] ?? value;
    return isPositive(own) ? [{ kind: 'constants', name, of: notes.get(name) ?? '', own, unit }] : [];
  });
  const unit = network.units?.amount ?? null;
  const starts = Object.entries({ ...network.start, ...given(settings, 'start') }).flatMap(
    ([name, own]): Tryable[] => (isPositive(own) ? [{ kind: 'start', name, of: 'start', own, unit }] : []),
  );
  return [...(kinds.includes('constants') ? constants : []), ...(kinds.includes('start') ? starts : [])];
}
