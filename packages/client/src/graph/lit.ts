import type { Witness } from '@stillroom/shared/cells';
import type { StructureResult } from '../components/results/shapes.ts';
import type { PlacedClass } from './chainLayout.ts';

/** The complexes of one class that are lit. */
export const classLit = ({ nodes }: PlacedClass, lit: ReadonlySet<number> | undefined): ReadonlySet<number> =>
  new Set(nodes.flatMap(({ index }) => (lit?.has(index) === true ? [index] : [])));

/** The complexes that a witness speaks of: those of an arrow, of a set, or of a vector's entries. */
export function complexesOf(witness: Witness, structure: StructureResult): ReadonlySet<number> {
  const { reactions = [], complexes = [] } = structure;
  const ends = (reaction: number) => {
    const arrow = reactions[reaction];
    return arrow === undefined ? [] : [arrow.from, arrow.to];
  };
  const holding = (species: readonly string[]) =>
    complexes.flatMap(({ of }, i) => (species.some((name) => name in of) ? [i] : []));
  switch (witness.kind) {
    case 'arrow':
      return new Set(ends(witness.reaction));
    case 'set':
      return new Set('species' in witness ? holding(witness.species) : witness.complexes);
    case 'vector':
      if (witness.of === 'complexes') return new Set(Object.keys(witness.entries).map(Number));
      if (witness.of === 'fluxes')
        return new Set(Object.keys(witness.entries).flatMap((key) => ends(Number(key))));
      return new Set(holding(Object.keys(witness.entries)));
    default:
      return new Set();
  }
}
