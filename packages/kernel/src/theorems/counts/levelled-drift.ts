import type { LinearCondition } from '../../exact/index.ts';
import { solveLinear } from '../../exact/index.ts';
import type { TheoremContext } from '../context.ts';
import {
  arrowsByReactant,
  freeSpecies,
  highestPowers,
  isOutgrown,
  LARGEST,
  notRaised,
  weightWords,
} from './linear-drift.ts';

/** Functions w⁰, w¹, …: for every choice of constants w⁰ + ε w¹ + ε² w² + … with ε small enough is drawn in. */
export interface LevelledDrift {
  readonly levels: readonly (readonly bigint[])[];
  readonly words: string;
}

interface Reactant {
  /** The change of the free species along each arrow. */
  readonly changes: readonly ReadonlyMap<number, bigint>[];
  /** Whether it is the highest power of one free species, and so has to be lowered. */
  readonly pivot: boolean;
}

const MOST_LEVELS = 8;

/**
 * A linear function that depends on the constants, where no single one serves all of them: a complex that one level lowers
 * (no arrow raises it, some arrow lowers it) may be raised by later ones, whose part is as small as the constants ask. Each
 * level lowers as many complexes as can be: the cone of such functions is convex. As `linearDrift` otherwise (Gupta, Briat,
 * Khammash 2014 look for such functions by constants). Null where the highest power of some species is never lowered.
 */
export function levelledDrift(context: TheoremContext): LevelledDrift | null {
  return context.memo('levelled drift', () => {
    if (!context.dense || context.species.length * context.arrows.length > LARGEST) return null;
    const free = freeSpecies(context);
    const powers = highestPowers(context, free);
    if (powers === null) return null;
    let open = heldReactants(context, free, powers);
    const levels: bigint[][] = [];
    while (open.some(({ pivot }) => pivot)) {
      const found = nextLevel(context.species.length, open);
      if (found === null || levels.length >= MOST_LEVELS) return null;
      levels.push(found.level);
      open = open.filter((reactant) => !found.lowered.has(reactant));
    }
    return { levels, words: weightWords(free) };
  });
}

function heldReactants(
  context: TheoremContext,
  free: readonly boolean[],
  powers: readonly number[],
): Reactant[] {
  return [...arrowsByReactant(context)].flatMap(([complex, arrows]): Reactant[] => {
    const all = context.terms(complex);
    const terms = all.filter(({ species }) => free[species]);
    if (isOutgrown(terms, powers)) return [];
    const changes = arrows.map((arrow) => {
      const { from, to } = context.arrows[arrow]!;
      return new Map([...context.coefficients.change(from, to)].filter(([species]) => free[species]));
    });
    const [first] = terms;
    const pivot = all.length === 1 && first !== undefined && powers[first.species] === first.coefficient;
    return [{ changes, pivot }];
  });
}

/** A function w ≥ 0 that raises no open reactant and lowers as many as can be; null where it can lower none. */
function nextLevel(
  species: number,
  open: readonly Reactant[],
): { readonly level: bigint[]; readonly lowered: ReadonlySet<Reactant> } | null {
  const kept = open.flatMap(({ changes }) => changes.map(notRaised));
  const lowered = new Set<Reactant>();
  let level = Array.from({ length: species }, () => 0n);
  for (;;) {
    const rest = open.filter((reactant) => !lowered.has(reactant));
    const fall = new Map<number, bigint>();
    for (const { changes } of rest)
      for (const change of changes) for (const [i, value] of change) fall.set(i, (fall.get(i) ?? 0n) - value);
    const some: LinearCondition = { terms: [...fall], relation: '>=', right: 1n };
    const outcome = solveLinear({ variables: species, conditions: [...kept, some] });
    if (outcome.kind !== 'feasible') break;
    level = level.map((value, i) => value + outcome.values[i]!);
    for (const reactant of rest) {
      const falls = reactant.changes.some(
        (change) => [...change].reduce((sum, [i, value]) => sum + value * outcome.values[i]!, 0n) < 0n,
      );
      if (falls) lowered.add(reactant);
    }
  }
  return lowered.size === 0 ? null : { level, lowered };
}
