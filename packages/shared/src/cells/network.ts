import * as z from 'zod/mini';

/** Settings of a network cell: none, all is in its text. */
export const networkSettings = z.strictObject({});

/** The units of every number of a result; null for a quantity that the text gives no unit. */
export interface ResultUnits {
  readonly time: string | null;
  readonly amount: string | null;
  readonly volume: string | null;
}

/** One arrow of a network as its result lists it. */
export interface ListedReaction {
  /** "E + S -> ES". */
  readonly label: string;
  /** Index of its row among the rows of the text, from 0. */
  readonly row: number;
  readonly from: Readonly<Record<string, number>>;
  readonly to: Readonly<Record<string, number>>;
  /** The rate as the text has it: "kf*E*S". */
  readonly rate: string;
  readonly note: string;
}

/** What a network text says, resolved. Above the limit of lists, `listed` is false and the long ones are empty. */
export interface NetworkResult {
  readonly species: readonly string[];
  readonly constants: readonly {
    readonly name: string;
    readonly value: number | null;
    readonly unit: string | null;
  }[];
  /** Start values that are not 0, and those of fixed species. */
  readonly start: Readonly<Record<string, number>>;
  readonly reactions: readonly ListedReaction[];
  /** Rate equations, typeset: d of/dt = tex. */
  readonly equations: readonly { readonly of: string; readonly tex: string }[];
  readonly canonical: string;
  readonly counts: { readonly species: number; readonly reactions: number; readonly constants: number };
  readonly listed?: false;
  readonly units: ResultUnits | null;
}
