import type { Node } from '../program/index.ts';

/** A further function of state and time that a system offers: one node for each number. */
export interface NamedNodes {
  readonly name: string;
  readonly nodes: readonly Node[];
}
