import type { Witness } from '@stillroom/shared/cells';
import type { StructureResult } from '../components/results/shapes.ts';
import type { PlacedClass } from './chainLayout.ts';

/** What a witness speaks of, by where it can be shown. A text beside a thing is its coefficient, "" without one. */
export interface Light {
  /** Indices of complexes. */
  readonly complexes: ReadonlySet<number>;
  /** Arrows of the graph of complexes, as `arrowKey` names them. */
  readonly arrows: ReadonlyMap<string, string>;
  /** Indices of reactions. */
  readonly reactions: ReadonlyMap<number, string>;
  readonly species: ReadonlyMap<string, string>;
  /** 0-based rows of the network's text. */
  readonly rows: ReadonlySet<number>;
}

/** The name of an arrow between two complexes. */
export const arrowKey = (from: number, to: number): string => `${from} ${to}`;

/** A coefficient as it stands beside what it belongs to. */
const coefficient = (value: number | string) => String(value).replace('-', '−');

/** Whether a witness can be lit: two numbers have no place in a picture. */
export const canLight = (witness: Witness): boolean => witness.kind !== 'number';

/** The complexes of one class that are lit. */
export const classLit = ({ nodes }: PlacedClass, lit: ReadonlySet<number> | undefined): ReadonlySet<number> =>
  new Set(nodes.flatMap(({ index }) => (lit?.has(index) === true ? [index] : [])));

/** What a witness lights: the arrow, the species or complexes of a set, a vector's entries with their coefficients. */
export function lightOf(witness: Witness, structure: StructureResult): Light {
  const { reactions = [], complexes = [] } = structure;

  const ofReactions = (entries: Iterable<readonly [number, string]>): Light => {
    const lit = [...entries].flatMap(([index, text]) => {
      const arrow = reactions[index];
      return arrow === undefined ? [] : [{ index, text, arrow }];
    });
    return {
      complexes: new Set(lit.flatMap(({ arrow }) => [arrow.from, arrow.to])),
      arrows: new Map(lit.map(({ arrow, text }) => [arrowKey(arrow.from, arrow.to), text])),
      reactions: new Map(lit.map(({ index, text }) => [index, text])),
      species: new Map(),
      rows: new Set(lit.map(({ arrow }) => arrow.row)),
    };
  };

  const ofComplexes = (indices: readonly number[]): Light => {
    const chosen = new Set(indices);
    return {
      complexes: chosen,
      arrows: new Map(),
      reactions: new Map(),
      species: new Map(),
      rows: new Set(
        reactions.flatMap(({ from, to, row }) => (chosen.has(from) || chosen.has(to) ? [row] : [])),
      ),
    };
  };

  const ofSpecies = (species: ReadonlyMap<string, string>): Light => {
    const names = [...species.keys()];
    const holding = complexes.flatMap(({ of }, i) => (names.some((name) => name in of) ? [i] : []));
    return { ...ofComplexes(holding), species };
  };

  switch (witness.kind) {
    case 'arrow':
      return ofReactions([[witness.reaction, '']]);
    case 'set':
      return 'species' in witness
        ? ofSpecies(new Map(witness.species.map((name) => [name, ''])))
        : ofComplexes(witness.complexes);
    case 'vector': {
      const entries = Object.entries(witness.entries).map(
        ([key, value]) => [key, coefficient(value)] as const,
      );
      if (witness.of === 'complexes') return ofComplexes(entries.map(([key]) => Number(key)));
      if (witness.of === 'fluxes') return ofReactions(entries.map(([key, text]) => [Number(key), text]));
      return ofSpecies(new Map(entries));
    }
    case 'minors': {
      const [first] = witness.pairs;
      if (first === undefined) return ofComplexes([]);
      return {
        ...ofReactions(first.reactions.map((reaction) => [reaction, ''])),
        species: new Map(first.species.map((name) => [name, ''])),
      };
    }
    default:
      return ofComplexes([]);
  }
}

/** What is lit, in words for those who do not see it. */
export function lightWords(words: string, { rows, complexes, arrows }: Light): string {
  const few = [...rows].sort((a, b) => a - b).map((row) => `R${row + 1}`);
  const inRows =
    few.length === 0
      ? ''
      : few.length <= 12
        ? `, in ${few.length === 1 ? 'row' : 'rows'} ${few.join(', ')}`
        : `, in ${few.length} rows`;
  const what = arrows.size > 0 ? 'arrow' : 'complex';
  const count = arrows.size > 0 ? arrows.size : complexes.size;
  const plural = count === 1 ? what : what === 'complex' ? 'complexes' : 'arrows';
  return `Lit: ${words}; ${count} ${plural}${inRows}. Escape puts it out.`;
}
