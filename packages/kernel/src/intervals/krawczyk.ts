import type { Interval } from './interval.ts';
import { add, insideOf, multiply, NAUGHT, point, scale, subtract } from './interval.ts';
import { inverse } from './dense.ts';

/** A square system F(x) = 0 that can be evaluated on boxes. */
export interface IntervalSystem {
  readonly size: number;
  /** An enclosure of F on a box. */
  values(box: readonly Interval[]): Interval[];
  /** An enclosure of the Jacobian of F on a box, by rows. */
  jacobian(box: readonly Interval[]): Interval[][];
}

/** Relative radii that are tried, from tight to wide. */
const RADII = [1e-12, 1e-11, 1e-10, 1e-9, 1e-8, 1e-7, 1e-6, 1e-5, 1e-4, 1e-3];

/**
 * A box of positive numbers around an approximate zero that is proven to hold exactly one zero, at which the Jacobian is
 * regular; null where no radius gave a proof. The operator is K(X) = x̂ − C F(x̂) + (I − C F'(X))(X − x̂) with C ≈ F'(x̂)⁻¹;
 * K(X) in the interior of X proves it (Krawczyk 1969; Rump 2010). Unknowns are scaled by x̂.
 */
export function verifiedBox(system: IntervalSystem, near: readonly number[]): Interval[] | null {
  if (near.some((value) => !(value > 0) || !Number.isFinite(value))) return null;
  const centre = near.map(point);
  const atCentre = system.values(centre);
  const preconditioner = inverse(
    system.jacobian(centre).map((row) => row.map(({ low, high }, k) => ((low + high) / 2) * near[k]!)),
  );
  if (preconditioner === null) return null;
  const step = applied(preconditioner, atCentre);
  for (const radius of RADII) {
    const box = near.map((value) => scale({ low: 1 - radius, high: 1 + radius }, value));
    // Relative coordinates ξ with x = x̂(1 + ξ); the box is |ξ| ≤ radius, a little more after rounding.
    const spread = { low: -radius * (1 + 1e-10), high: radius * (1 + 1e-10) };
    const jacobian = system.jacobian(box).map((row) => row.map((entry, k) => scale(entry, near[k]!)));
    const contained = preconditioner.every((weights, i) => {
      let image = subtract(NAUGHT_POINT, step[i]!);
      for (let k = 0; k < system.size; k++) {
        let entry: Interval = NAUGHT;
        for (let j = 0; j < system.size; j++) entry = add(entry, scale(jacobian[j]![k]!, weights[j]!));
        const defect = subtract(point(i === k ? 1 : 0), entry);
        image = add(image, multiply(defect, spread));
      }
      return insideOf(image, { low: -radius, high: radius });
    });
    if (contained) return box;
  }
  return null;
}

const NAUGHT_POINT = point(0);

function applied(matrix: readonly (readonly number[])[], vector: readonly Interval[]): Interval[] {
  return matrix.map((row) =>
    row.reduce<Interval>((sum, weight, k) => add(sum, scale(vector[k]!, weight)), NAUGHT),
  );
}
