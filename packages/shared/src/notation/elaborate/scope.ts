import type { IndexValues, Slots } from './integers.ts';

/** Where an expression stands: which indices it may use and what they are. */
export interface Scope {
  readonly slots: Slots;
  readonly values: IndexValues;
  /** Whether `n` is the count of a species, as in a weight. */
  readonly count: boolean;
  /** Whether `2 /s` is two per second even where `s` names something: so in constants and starts. */
  readonly unitsFirst: boolean;
}

/** The scope of what is in no family. */
export const outermost: Scope = { slots: new Map(), values: [], count: false, unitsFirst: false };

/** The scope of a value that must be a number: a rate constant, a start. */
export const valueScope: Scope = { ...outermost, unitsFirst: true };

/** The scope of a member of a family; keeps a copy of the indices. */
export function memberScope(slots: Slots, values: IndexValues, scope: Scope = outermost): Scope {
  return slots.size === 0 ? scope : { ...scope, slots, values: [...values] };
}
