import type { LinearCondition } from '../../exact/index.ts';
import { solveLinear } from '../../exact/index.ts';
import type { TheoremContext } from '../context.ts';
import type { Domain } from './domain.ts';
import { NAUGHT, NEGATIVE, POSITIVE } from './domain.ts';

/** An integer vector, null where none exists, 'unfinished' where the pivot limit was reached. */
export type SignedVector = bigint[] | null | 'unfinished';

/** A vector of the stoichiometric subspace (scaled units) with the given signs. */
export function subspaceVector(context: TheoremContext, signs: ArrayLike<Domain>): SignedVector {
  return signedVector(
    context.memo('law equations', () => context.lawBasis.map(equationOf)),
    signs,
  );
}

/** A vector of the kernel of N with the given signs. */
export function kernelVector(context: TheoremContext, signs: ArrayLike<Domain>): SignedVector {
  return signedVector(
    context.memo('kernel equations', () => context.stoichiometricMatrix.entries.map(equationOf)),
    signs,
  );
}

/**
 * A vector z with the given signs for which the sums Σ y_i z_i over the reactants of each arrow have the signs given
 * for it: what makes a pattern possible for mass action.
 */
export function reactantVector(
  context: TheoremContext,
  signs: ArrayLike<Domain>,
  fluxes: ArrayLike<Domain>,
): SignedVector {
  const conditions: LinearCondition[] = [];
  context.arrows.forEach(({ from }, arrow) => {
    const domain = fluxes[arrow]!;
    const terms = context
      .terms(from)
      .map(({ species }) => [species, context.coefficients.scaled(from, species)] as const);
    // With one reactant the sign of the sum is the sign of z.
    if (terms.length < 2) return;
    if (domain === NAUGHT) conditions.push({ terms, relation: '=', right: 0n });
    if (domain === POSITIVE) conditions.push({ terms, relation: '>=', right: 1n });
    if (domain === NEGATIVE)
      conditions.push({ terms: terms.map(([k, c]) => [k, -c] as const), relation: '>=', right: 1n });
  });
  return signedVector(conditions, signs);
}

function equationOf(row: readonly bigint[]): LinearCondition {
  const terms: [number, bigint][] = [];
  row.forEach((coefficient, k) => {
    if (coefficient !== 0n) terms.push([k, coefficient]);
  });
  return { terms, relation: '=', right: 0n };
}

/**
 * Solves conditions on unknowns of given signs: x = s·(u + least) with u ≥ 0, least 1 for strict signs (the cones are
 * closed under scaling), so that signs cost no rows.
 */
export function signedVector(conditions: readonly LinearCondition[], signs: ArrayLike<Domain>): SignedVector {
  const sense: bigint[] = [];
  const least: bigint[] = [];
  const free: boolean[] = [];
  for (let k = 0; k < signs.length; k++) {
    const domain = signs[k]!;
    const canRise = (domain & POSITIVE) !== 0;
    const canFall = (domain & NEGATIVE) !== 0;
    sense.push(domain === NAUGHT ? 0n : canRise ? 1n : -1n);
    free.push(canRise && canFall);
    least.push(domain === POSITIVE || domain === NEGATIVE ? 1n : 0n);
  }
  const moved = conditions.map(({ terms, relation, right }): LinearCondition => {
    const kept: [number, bigint][] = [];
    let rest = right;
    for (const [k, coefficient] of terms) {
      const signed = coefficient * sense[k]!;
      if (signed === 0n) continue;
      kept.push([k, signed]);
      rest -= signed * least[k]!;
    }
    return { terms: kept, relation, right: rest };
  });
  const outcome = solveLinear({ variables: signs.length, free: (k) => free[k]!, conditions: moved }, 2000);
  if (outcome.kind === 'unfinished') return 'unfinished';
  if (outcome.kind === 'infeasible') return null;
  return outcome.values.map((u, k) => sense[k]! * (u + least[k]! * outcome.denominator));
}
