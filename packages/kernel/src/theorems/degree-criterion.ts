import type { Hypothesis } from '@stillroom/shared/cells';
import type { TheoremContext } from './context.ts';
import { linearDrift } from './counts/linear-drift.ts';
import { endotacticity } from './endotactic/strongly-endotactic.ts';
import { fluxConeRays } from './flux-cone.ts';
import { conservative, massAction, noCriticalSiphon, STRONGLY_ENDOTACTIC } from './hypotheses.ts';
import { visitMinorProducts } from './minors/minor-products.ts';

/** Extreme fluxes, steps of their enumeration, partial choices of reactions and terms up to which the sign is expanded. */
const RAY_LIMITS = { rays: 24, steps: 60_000 } as const;
const LIST_STEPS = 6_000;
const MOST_TERMS = 60_000;

/**
 * The degree criterion (Conradi, Feliu, Mincheva, Wiuf 2017): where solutions stay in a compact part of their class and no
 * steady state of a positive class lies on the boundary, the signs of the Jacobian determinants of the positive steady
 * states of a class add up to (−1)^s; so if all of them have this sign there is exactly one. All states and constants are
 * v = Σ λ_r E_r over the extreme fluxes and h = 1/x (Clarke 1988); the determinant is a polynomial in λ and h, and it has
 * one sign when its coefficients have. A permanent network needs no condition on the boundary (Hofbauer 1990), and rank 1 neither, where "at most one" is
 * a matter of one continuous function.
 * The hypotheses as they hold, or null where one of them does not or is too large.
 */
export function degreeCriterion(context: TheoremContext): readonly Hypothesis[] | null {
  return context.memo('degree criterion', () => {
    const rates = massAction(context);
    if (rates.holds !== true || !context.dense || context.rank === null) return null;
    if (context.consistency?.holds !== true) return null;
    const signs = criticalSigns(context);
    if (signs.kind !== 'one sign') return null;
    const confined = confinement(context);
    if (confined === null) return null;
    return [
      rates,
      ...confined,
      {
        claim: 'critical polynomial of one sign',
        text: `At every positive steady state the determinant of the Jacobian on its class has the sign of (−1)^s: all ${signs.count} coefficients of the determinant, as a polynomial in the weights of the extreme fluxes and in the inverse concentrations, have it.`,
        holds: true,
      },
    ];
  });
}

/** Why solutions cannot come close to infinity, nor steady states lie on the boundary; null where it is not known. */
function confinement(context: TheoremContext): Hypothesis[] | null {
  if (context.rank === 1) {
    return [
      {
        claim: 'rank one',
        text: 'The rank is 1, so a class is an interval, where one function cannot cross zero downwards twice in a row.',
        holds: true,
        witness: { kind: 'number', left: 1, right: 1 },
      },
    ];
  }
  const siphons = noCriticalSiphon(context);
  if (siphons.every(({ holds }) => holds === true)) {
    const law = conservative(context);
    if (law.holds === true) return [law, ...siphons];
    const drift = linearDrift(context, 'inward');
    if (drift?.scope === 'all constants') {
      const inward: Hypothesis = {
        claim: 'inward drift',
        text: `A linear function ${drift.words} falls along solutions outside a compact part of each class.`,
        holds: true,
        witness: {
          kind: 'vector',
          of: 'laws',
          entries: context.lawEntries(context.coefficients.unscale(drift.weights)),
        },
      };
      return [inward, ...siphons];
    }
  }
  return endotacticity(context).kind === 'yes'
    ? [{ claim: 'strongly endotactic', text: STRONGLY_ENDOTACTIC, holds: true }]
    : null;
}

/**
 * What the coefficients of the critical polynomial say: all of the sign of (−1)^s (how many there are), all zero (every
 * positive steady state is degenerate), anything else, or too large to expand.
 */
export type CriticalSigns =
  | { readonly kind: 'one sign'; readonly count: number }
  | { readonly kind: 'zero' }
  | { readonly kind: 'mixed' }
  | { readonly kind: 'open' };

/** The signs of the coefficients, exactly. */
export function criticalSigns(context: TheoremContext): CriticalSigns {
  return context.memo('critical signs', () => {
    const coefficients = context.dense ? criticalPolynomial(context) : null;
    if (coefficients === null || context.rank === null) return { kind: 'open' };
    const values = [...coefficients.values()].filter((value) => value !== 0n);
    if (values.length === 0) return { kind: 'zero' };
    const positive = context.rank % 2 === 0;
    return values.every((value) => value > 0n === positive)
      ? { kind: 'one sign', count: values.length }
      : { kind: 'mixed' };
  });
}

/** Coefficients by species I and powers of the weights of the extreme fluxes; null beyond the limits. */
function criticalPolynomial(context: TheoremContext): ReadonlyMap<string, bigint> | null {
  const rays = fluxConeRays(context, RAY_LIMITS);
  if (rays === null || rays.length === 0) return null;
  const weights = context.arrows.map((_, arrow) =>
    rays.flatMap((ray, r) => (ray.has(arrow) ? [{ ray: r, value: ray.get(arrow)! }] : [])),
  );
  const reacting = context.arrows
    .map((_, arrow) => arrow)
    .filter((arrow) => context.terms(context.arrows[arrow]!.from).length > 0);
  const coefficients = new Map<string, bigint>();
  let left = MOST_TERMS;
  const complete = visitMinorProducts(context, reacting, LIST_STEPS, ({ species, arrows }, product) => {
    const prefix = species.join();
    const powers = rays.map(() => 0);
    const expand = (k: number, value: bigint): void => {
      if (left < 0) return;
      if (k === arrows.length) {
        left--;
        const key = `${prefix}|${powers.join()}`;
        coefficients.set(key, (coefficients.get(key) ?? 0n) + value);
        return;
      }
      for (const { ray, value: factor } of weights[arrows[k]!]!) {
        powers[ray]!++;
        expand(k + 1, value * factor);
        powers[ray]!--;
      }
    };
    expand(0, product);
    return left >= 0;
  });
  return complete ? coefficients : null;
}
