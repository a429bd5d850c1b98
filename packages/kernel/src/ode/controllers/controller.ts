/** Chooses the next step size from the scaled error of the last one (1 is just tolerable). */
export interface Controller {
  /** After an accepted step of size h with error `error`. */
  accept(h: number, error: number): number;
  /** After a rejected one. */
  reject(h: number, error: number): number;
  /** Forgets the past, after a jump. */
  reset(): void;
}

/** `value` brought into least..most. */
export function clamp(value: number, least: number, most: number): number {
  return value < least ? least : value > most ? most : value;
}
