import type { ResultUnits } from '@stillroom/shared/cells';
import type { Network } from '@stillroom/shared/network';

/** The units of a network's results; null where the text has none. */
export function resultUnits({ units }: Network): ResultUnits | null {
  const { time, amount, volume } = units;
  return time === null && amount === null && volume === null ? null : { time, amount, volume };
}
