import { solveLinear } from '../exact/index.ts';
import type { LinearCondition, SparseVector } from '../exact/index.ts';
import type { StructuralNetwork } from '../network/index.ts';
import type { Structure } from '../structure/index.ts';
import type { Coefficients } from './coefficients.ts';

/** A positive flux in the kernel of N, or a linear function of the species that no arrow lowers and some arrow raises. */
export type Consistency =
  { readonly holds: true; readonly flux: bigint[] } | { readonly holds: false; readonly growing: bigint[] };

/** A law with positive coefficients, or a flux (of any sign) whose net production is nowhere negative and not zero. */
export type Conservation =
  { readonly holds: true; readonly law: bigint[] } | { readonly holds: false; readonly flux: bigint[] };

/** What is looked at; a `TheoremContext` is one. */
interface Stoichiometry {
  readonly structure: StructuralNetwork;
  readonly analysis: Structure;
  readonly species: readonly string[];
  readonly arrows: readonly { readonly from: number; readonly to: number }[];
  readonly coefficients: Coefficients;
  readonly circulation: readonly bigint[] | null;
  memo<T>(name: string, compute: () => T): T;
}

/** Tableau entries above which the exact programmes are not started. */
const LARGEST_PROGRAMME = 400_000;

/**
 * Consistent or not, with proof: v = 1 + u, u ≥ 0 with N u = −N 1 by exact linear programming; the alternative is
 * Stiemke's. Weakly reversible networks need no programme.
 */
export function decideConsistency(context: Stoichiometry): Consistency | null {
  const circulation = context.circulation;
  if (circulation !== null) return { holds: true, flux: [...circulation] };
  if (tableauSize(context.species.length, context.arrows.length) > LARGEST_PROGRAMME) return null;
  const columns = changes(context);
  const conditions = context.species.map((_, i): LinearCondition => {
    const terms: [number, bigint][] = [];
    let right = 0n;
    columns.forEach((column, arrow) => {
      const change = column.get(i);
      if (change === undefined) return;
      terms.push([arrow, change]);
      right -= change;
    });
    return { terms, relation: '=', right };
  });
  const outcome = solveLinear({ variables: columns.length, conditions });
  if (outcome.kind === 'unfinished') return null;
  return outcome.kind === 'feasible'
    ? { holds: true, flux: outcome.values.map((value) => value + outcome.denominator) }
    : { holds: false, growing: context.coefficients.unscale(outcome.multipliers.map((y) => -y)) };
}

/** Conservative or not, with proof: w = 1 + u, u ≥ 0 with u N = −1 N. */
export function decideConservation(context: Stoichiometry): Conservation | null {
  const known = context.analysis.conservative;
  if (known.holds === true) return { holds: true, law: denseLaw(context, known.law) };
  if (tableauSize(context.arrows.length, context.species.length) > LARGEST_PROGRAMME) return null;
  const columns = changes(context);
  const used = columns
    .map((_, arrow) => arrow)
    .filter((arrow) => {
      const reverse = context.structure.arrows.reverse[arrow]!;
      return reverse < 0 || reverse > arrow;
    });
  const conditions = used.map((arrow): LinearCondition => {
    const terms = [...columns[arrow]!];
    return { terms, relation: '=', right: -terms.reduce((sum, [, change]) => sum + change, 0n) };
  });
  const outcome = solveLinear({ variables: context.species.length, conditions });
  if (outcome.kind === 'unfinished') return null;
  if (outcome.kind === 'feasible') {
    return {
      holds: true,
      law: context.coefficients.unscale(outcome.values.map((value) => value + outcome.denominator)),
    };
  }
  const flux = columns.map(() => 0n);
  used.forEach((arrow, k) => (flux[arrow] = -outcome.multipliers[k]!));
  return { holds: false, flux };
}

function changes(context: Stoichiometry): ReadonlyMap<number, bigint>[] {
  return context.memo('changes', () =>
    context.arrows.map(({ from, to }) => context.coefficients.change(from, to)),
  );
}

function tableauSize(conditions: number, variables: number): number {
  return (conditions + 1) * (variables + conditions + 1);
}

function denseLaw(context: Stoichiometry, { indices, values }: SparseVector): bigint[] {
  const law = context.species.map(() => 0n);
  indices.forEach((species, k) => (law[species] = values[k]!));
  return law;
}
