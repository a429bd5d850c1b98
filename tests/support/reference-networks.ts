import { readFileSync } from 'node:fs';
import type { Network } from '@stillroom/shared/network';
import { buildNetwork } from './network.ts';

type Side = Readonly<Record<string, number>>;

/** A network of tests/reference/structure.json with the numbers an exact computation outside this project gave. */
export interface ReferenceNetwork {
  readonly id: string;
  readonly reactions: readonly { readonly from: Side; readonly to: Side; readonly reversible: boolean }[];
  readonly oracle: {
    readonly species: readonly string[];
    readonly complexes: readonly string[];
    readonly reactions: readonly (readonly [string, string])[];
    readonly counts: {
      readonly species: number;
      readonly n: number;
      readonly reactions: number;
      readonly linkage_classes: number;
      readonly strong_linkage_classes: number;
      readonly terminal_strong_linkage_classes: number;
      readonly rank: number;
      readonly deficiency: number;
      readonly conservation_laws: number;
    };
    readonly linkage_classes: readonly {
      readonly complexes: readonly string[];
      readonly n: number;
      readonly rank: number;
      readonly deficiency: number;
      readonly terminal_classes: number;
      readonly strong_classes: number;
    }[];
    readonly terminal_strong_classes: readonly (readonly string[])[];
    readonly reversible: boolean;
    readonly weakly_reversible: boolean;
    readonly conservation_basis: readonly Side[];
    readonly extreme_nonnegative_laws: readonly Side[];
    readonly conservative: boolean;
    readonly consistent: boolean;
    readonly minimal_siphons: readonly (readonly string[])[] | null;
    readonly critical_minimal_siphons: readonly (readonly string[])[] | null;
    readonly acr_candidates: readonly unknown[];
  };
}

/** The carried reference table; its own meta says how each number was obtained. */
export const referenceNetworks: readonly ReferenceNetwork[] = (
  JSON.parse(readFileSync(new URL('../reference/structure.json', import.meta.url), 'utf8')) as {
    networks: ReferenceNetwork[];
  }
).networks;

/** The network of one entry of the table, species and complexes in order of first appearance. */
export function referenceNetwork(entry: ReferenceNetwork): Network {
  return networkOfSides(entry.reactions);
}

/** A network from its reactions by sides. */
export function networkOfSides(
  reactions: readonly { readonly from: Side; readonly to: Side; readonly reversible?: boolean }[],
): Network {
  return buildNetwork(rowsOfSides(reactions).join('; '));
}

/** The rows of an entry of the table, as a text would have them. */
export const referenceRows = (entry: ReferenceNetwork): readonly string[] => rowsOfSides(entry.reactions);

function rowsOfSides(
  reactions: readonly { readonly from: Side; readonly to: Side; readonly reversible?: boolean }[],
): string[] {
  const side = (terms: Side) =>
    Object.entries(terms)
      .map(([name, coefficient]) => `${coefficient} ${name}`)
      .join(' + ') || '0';
  return reactions.map(
    ({ from, to, reversible }) => `${side(from)} ${reversible ? '<=>' : '->'} ${side(to)}`,
  );
}
