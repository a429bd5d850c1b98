import type { LinearCondition } from '../../exact/index.ts';
import type { TheoremContext } from '../context.ts';
import type { Domain } from '../signs/domain.ts';
import { ANY, NAUGHT, NEGATIVE, POSITIVE, settled } from '../signs/domain.ts';
import { signedVector, subspaceVector } from '../signs/sign-vectors.ts';
import type { RegularNetwork } from './regular.ts';
import { regularNetwork } from './regular.ts';

/** How a terminal class stands to the level M: its complexes have y·μ above, at or below it. */
export type Shelf = 'upper' | 'middle' | 'lower';

/**
 * - `several`: μ (scaled units) and M that meet every condition, σ in the stoichiometric subspace with the signs of μ, and
 *   the g they belong to.
 * - `at most one`: every case was excluded, which is a proof for all constants.
 * - `open`: too many cases. `inapplicable`: the network is not regular of deficiency one.
 */
export type AlgorithmOutcome =
  | {
      readonly kind: 'several';
      readonly mu: readonly bigint[];
      readonly level: bigint;
      readonly sigma: readonly bigint[];
      readonly g: readonly bigint[];
      readonly cases: number;
    }
  | { readonly kind: 'at most one'; readonly cases: number }
  | { readonly kind: 'open'; readonly cases: number }
  | { readonly kind: 'inapplicable'; readonly why: string };

/** Terminal classes up to which all 3^t ways to put them on shelves are tried. */
const MOST_CLASSES = 6;
/** Nodes of all searches together times species times arrows. */
const WORK = 1_200_000;

/**
 * The deficiency one algorithm: whether some constants give several positive steady states in one class, decided exactly
 * (Feinberg 1988, 1995). Each case is a system of linear equations and inequalities in μ and M; signs of μ are branched
 * on until σ in im N has the same ones.
 */
export function deficiencyOneAlgorithm(context: TheoremContext): AlgorithmOutcome {
  return context.memo('deficiency one algorithm', () => {
    const regular = regularNetwork(context);
    if (typeof regular === 'string') return { kind: 'inapplicable', why: regular };
    if (!context.dense || regular.classes.length > MOST_CLASSES) return { kind: 'open', cases: 0 };
    const state: SearchState = {
      context,
      left: Math.ceil(WORK / (context.species.length * context.arrows.length)),
      open: false,
    };
    const orientations = regular.allTerminal ? [regular.g, regular.g.map((value) => -value)] : [regular.g];
    const cases = shelvings(regular.classes.length);
    for (const g of orientations) {
      const flip = g === regular.g ? 1n : -1n;
      for (const shelves of cases) {
        const found = searchCase(state, conditionsOf(context, regular, shelves, flip));
        if (found !== null) return { kind: 'several', ...found, g, cases: cases.length };
        if (state.open) return { kind: 'open', cases: cases.length };
      }
    }
    return { kind: 'at most one', cases: cases.length * orientations.length };
  });
}

function shelvings(classes: number): Shelf[][] {
  let all: Shelf[][] = [[]];
  for (let k = 0; k < classes; k++) {
    all = all.flatMap((shelves) =>
      (['upper', 'middle', 'lower'] as const).map((shelf) => [...shelves, shelf]),
    );
  }
  return all;
}

/** Unknowns: μ by species in scaled units, then M. Strict inequalities are ≥ 1, since solutions may be scaled. */
function conditionsOf(
  context: TheoremContext,
  regular: RegularNetwork,
  shelves: readonly Shelf[],
  flip: bigint,
): LinearCondition[] {
  const level = context.species.length;
  const conditions: LinearCondition[] = [];
  const aboveLevel = (complex: number, sense: bigint): [number, bigint][] => [
    ...context
      .terms(complex)
      .map(({ species }): [number, bigint] => [
        species,
        sense * context.coefficients.scaled(complex, species),
      ]),
    [level, -sense],
  ];
  const atLevel = (complex: number): void => {
    conditions.push({ terms: aboveLevel(complex, 1n), relation: '=', right: 0n });
  };
  context.nonterminalComplexes.forEach(atLevel);
  regular.classes.forEach(({ complexes, pairs }, k) => {
    const shelf = shelves[k]!;
    if (shelf === 'middle') {
      complexes.forEach(atLevel);
      return;
    }
    const sense = shelf === 'upper' ? 1n : -1n;
    for (const complex of complexes)
      conditions.push({ terms: aboveLevel(complex, sense), relation: '>=', right: 1n });
    for (const { from, to, net } of pairs) {
      const rise = [...context.coefficients.change(from, to)];
      const direction = net === 0n ? 0n : (net > 0n ? 1n : -1n) * flip * sense;
      conditions.push(
        direction === 0n
          ? { terms: rise, relation: '=', right: 0n }
          : { terms: rise.map(([i, value]) => [i, value * direction] as const), relation: '>=', right: 1n },
      );
    }
  });
  return conditions;
}

interface SearchState {
  readonly context: TheoremContext;
  left: number;
  open: boolean;
}

interface Solution {
  readonly mu: readonly bigint[];
  readonly level: bigint;
  readonly sigma: readonly bigint[];
}

/** μ ≠ 0: its first entry that is not 0 is positive or negative, the earlier ones are 0. */
function searchCase(state: SearchState, conditions: readonly LinearCondition[]): Solution | null {
  const size = state.context.species.length;
  const domains = new Uint8Array(size + 1).fill(ANY);
  for (let lead = 0; lead < size; lead++) {
    for (const sign of [POSITIVE, NEGATIVE]) {
      domains[lead] = sign;
      const found = visit(state, conditions, domains);
      if (found !== null || state.open) return found;
    }
    domains[lead] = NAUGHT;
    if (signedVector(conditions, domains) === null) return null;
  }
  return null;
}

function visit(
  state: SearchState,
  conditions: readonly LinearCondition[],
  domains: Uint8Array,
): Solution | null {
  if (--state.left < 0) {
    state.open = true;
    return null;
  }
  const { context } = state;
  const size = context.species.length;
  const solution = signedVector(conditions, domains);
  if (solution === null) return null;
  const within = subspaceVector(context, domains.subarray(0, size));
  if (within === null) return null;
  if (solution === 'unfinished' || within === 'unfinished') {
    state.open = true;
    return null;
  }
  const mu = solution.slice(0, size);
  // Often the first solution already has the signs of a vector of im N.
  const sigma = subspaceVector(context, mu.map(signOf));
  if (sigma !== null && sigma !== 'unfinished') return { mu, level: solution[size]!, sigma };
  const branch = domains.findIndex((domain, i) => i < size && !settled(domain));
  if (branch < 0) return null;
  for (const sign of [POSITIVE, NEGATIVE, NAUGHT]) {
    const next = domains.slice();
    next[branch] = sign;
    const found = visit(state, conditions, next);
    if (found !== null || state.open) return found;
  }
  return null;
}

function signOf(value: bigint): Domain {
  return value > 0n ? POSITIVE : value < 0n ? NEGATIVE : NAUGHT;
}
