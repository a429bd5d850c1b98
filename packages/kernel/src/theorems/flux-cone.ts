import { extremeRays } from '../structure/extreme-rays.ts';
import type { Inequality, Ray, RayLimits } from '../structure/extreme-rays.ts';
import type { TheoremContext } from './context.ts';

/**
 * The extreme rays of the cone of fluxes v ≥ 0 with N v = 0, by arrow (Clarke 1988: every flux of a steady state is a sum
 * of these). Null beyond the limits. Only where `dense`.
 */
export function fluxConeRays(context: TheoremContext, limits: RayLimits): readonly Ray[] | null {
  return context.memo(`flux cone ${limits.rays}`, () => {
    const inequalities = context.stoichiometricMatrix.entries.flatMap((row): Inequality[] => {
      const terms = row.flatMap((value, j) => (value === 0n ? [] : [[j, value] as const]));
      return [terms, terms.map(([j, value]) => [j, -value] as const)];
    });
    return extremeRays(context.arrows.length, inequalities, limits).rays;
  });
}
