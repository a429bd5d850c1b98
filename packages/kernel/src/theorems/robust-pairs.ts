import type { TheoremContext } from './context.ts';

/** Two non-terminal complexes that differ in one species; `upper` has more of it. */
export interface RobustPair {
  readonly species: number;
  readonly lower: number;
  readonly upper: number;
}

/**
 * Every pair of non-terminal complexes that differ in exactly one species, once per species and upper complex. Each
 * complex is filed under itself with one of its species struck out, so the cost is that of writing the complexes down.
 */
export function robustPairs(context: TheoremContext): RobustPair[] {
  return context.memo('robust pairs', () => {
    if (context.huge) return [];
    const filed = new Map<string, number[]>();
    const pairs: RobustPair[] = [];
    for (const complex of context.nonterminalComplexes) file(filed, keyOf(context, complex, -1), complex);
    for (const complex of context.nonterminalComplexes) {
      for (const { species } of context.terms(complex)) {
        const key = `${species}|${keyOf(context, complex, species)}`;
        const partners = [...(filed.get(keyOf(context, complex, species)) ?? []), ...(filed.get(key) ?? [])];
        for (const partner of partners) pairs.push(ordered(context, species, partner, complex));
        file(filed, key, complex);
      }
    }
    return pairs;
  });
}

/** Names of the robust species, in order of first appearance. */
export function robustNames(context: TheoremContext): string[] {
  const species = new Set(robustPairs(context).map((pair) => pair.species));
  return context.species.filter((_, i) => species.has(i));
}

function ordered(context: TheoremContext, species: number, a: number, b: number): RobustPair {
  return context.coefficient(a, species) < context.coefficient(b, species)
    ? { species, lower: a, upper: b }
    : { species, lower: b, upper: a };
}

function keyOf(context: TheoremContext, complex: number, without: number): string {
  return context
    .terms(complex)
    .filter((term) => term.species !== without)
    .map((term) => `${term.species}:${term.coefficient}`)
    .join();
}

function file(filed: Map<string, number[]>, key: string, complex: number): void {
  const list = filed.get(key);
  if (list) list.push(complex);
  else filed.set(key, [complex]);
}

/** Complexes above which nested pairs are searched among robust pairs only. */
const NESTED_SEARCH = 1000;

/** Pairs of non-terminal complexes y ≤ y', y ≠ y': the robust ones, or else the first nested one found. */
export function comparablePairs(context: TheoremContext): { lower: number; upper: number }[] {
  const robust = robustPairs(context);
  const candidates = context.nonterminalComplexes;
  if (robust.length > 0 || candidates.length > NESTED_SEARCH) return robust;
  for (const upper of candidates) {
    for (const lower of candidates) {
      if (lower === upper) continue;
      if (
        context
          .terms(lower)
          .every(({ species, coefficient }) => coefficient <= context.coefficient(upper, species))
      ) {
        return [{ lower, upper }];
      }
    }
  }
  return [];
}
