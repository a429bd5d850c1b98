import type { Network } from '../network/network.ts';

/** A repair the reader may take with one click: replace `from`..`to` (offsets in the text) by `insert`. */
export interface Repair {
  /** Names its result: "Make it 2 /s". */
  readonly label: string;
  readonly from: number;
  readonly to: number;
  readonly insert: string;
}

/** Something wrong or doubtful in a text, at its place. Lines and columns are 1-based, offsets 0-based UTF-16. */
export interface Complaint {
  readonly severity: 'error' | 'warning';
  readonly line: number;
  readonly column: number;
  readonly from: number;
  readonly to: number;
  /** What is wrong, in one sentence. */
  readonly message: string;
  /** Why, or what to do, in one more. */
  readonly hint: string | null;
  readonly repairs: readonly Repair[];
}

/** What reading a network text gives: never throws; `network` is null where an error stands in the way. */
export interface NotationReading {
  readonly network: Network | null;
  readonly complaints: readonly Complaint[];
}
