import type { MinorPair } from '@stillroom/shared/cells';
import type { TheoremContext } from '../context.ts';
import { fixedSequence } from '../fixed-sequence.ts';
import type { MinorIndices } from './minor-products.ts';
import { minorPair, reactantMinor, stoichiometricMinor } from './minor-products.ts';
import type { SquareSystem } from './weighted-sum.ts';
import { squareSystem, weightedSum } from './weighted-sum.ts';

/** Random starts of the search for a pair of each sign. */
const STARTS = 60;

/**
 * Looks for two products det N[I,J] · det B[J,I] of opposite sign: the sign of Σ κ^J h^I · product at weights spread over
 * many powers of ten is that of its largest term, and dropping species and reactions while the sign stays leads to one
 * product. Doubles propose, exact determinants decide; null only means that none was met.
 */
export function oppositeMinors(context: TheoremContext): readonly [MinorPair, MinorPair] | null {
  const found = oppositeIndices(context);
  return found && [minorPair(context, found.positive), minorPair(context, found.negative)];
}

/** The same as indices, worked out once. */
export function oppositeIndices(
  context: TheoremContext,
): { readonly positive: MinorIndices; readonly negative: MinorIndices } | null {
  return context.memo('opposite minors', () => {
    const system = squareSystem(context);
    if (system === null) return null;
    const random = fixedSequence(12345);
    const found = new Map<number, MinorIndices>();
    for (let start = 0; start < STARTS && found.size < 2; start++) {
      const spread = start % 3 === 0 ? 1 : start % 3 === 1 ? 6 : 12;
      const kappa = system.reactions.map(() => 2 ** Math.round(spread * (random() - 0.5) * 2));
      const h = system.species.map(() => 2 ** Math.round(spread * (random() - 0.5) * 2));
      const sign = weightedSum(system, kappa, h);
      if (sign === 0 || found.has(sign)) continue;
      const indices = isolate(system, kappa, h, sign);
      if (indices === null) continue;
      const product = stoichiometricMinor(context, indices) * reactantMinor(context, indices);
      const exactSign = product > 0n ? 1 : product < 0n ? -1 : 0;
      if (exactSign !== 0 && !found.has(exactSign)) found.set(exactSign, indices);
    }
    const positive = found.get(1);
    const negative = found.get(-1);
    return positive !== undefined && negative !== undefined ? { positive, negative } : null;
  });
}

/** Drops every weight that the sign can do without and raises the others, until one I and one J are left. */
function isolate(system: SquareSystem, kappa: number[], h: number[], sign: number): MinorIndices | null {
  for (const weights of [kappa, h]) {
    for (let k = 0; k < weights.length; k++) {
      const before = weights[k]!;
      weights[k] = 0;
      if (weightedSum(system, kappa, h) !== sign) weights[k] = before * 2 ** 16;
    }
  }
  const arrows = system.reactions.filter((_, j) => kappa[j] !== 0);
  const species = system.species.filter((i) => h[i] !== 0);
  return arrows.length === system.rank && species.length === system.rank ? { species, arrows } : null;
}
