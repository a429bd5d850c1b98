import type { MinorPair } from '@stillroom/shared/cells';
import type { TheoremContext } from '../context.ts';
import type { MinorIndices } from './minor-products.ts';
import { minorPair, reactantMinor, stoichiometricMinor } from './minor-products.ts';

/** Random starts of the search for a pair of each sign. */
const STARTS = 60;

/**
 * Looks for two products det N[I,J] · det B[J,I] of opposite sign: the sign of Σ κ^J h^I · product at weights spread over
 * many powers of ten is that of its largest term, and dropping species and reactions while the sign stays leads to one
 * product. Doubles propose, exact determinants decide; null only means that none was met.
 */
export function oppositeMinors(context: TheoremContext): readonly [MinorPair, MinorPair] | null {
  const system = squareSystem(context);
  if (system === null) return null;
  const random = sequence(12345);
  const found = new Map<number, MinorPair>();
  for (let start = 0; start < STARTS && found.size < 2; start++) {
    const spread = start % 3 === 0 ? 1 : start % 3 === 1 ? 6 : 12;
    const kappa = system.reactions.map(() => 2 ** (spread * (random() - 0.5) * 2));
    const h = system.species.map(() => 2 ** (spread * (random() - 0.5) * 2));
    const sign = weightedSum(system, kappa, h);
    if (sign === 0 || found.has(sign)) continue;
    const indices = isolate(system, kappa, h, sign);
    if (indices === null) continue;
    const product = stoichiometricMinor(context, indices) * reactantMinor(context, indices);
    const exactSign = product > 0n ? 1 : product < 0n ? -1 : 0;
    if (exactSign !== 0 && !found.has(exactSign)) found.set(exactSign, minorPair(context, indices));
  }
  const positive = found.get(1);
  const negative = found.get(-1);
  return positive !== undefined && negative !== undefined ? [positive, negative] : null;
}

interface SquareSystem {
  readonly rank: number;
  readonly species: readonly number[];
  readonly reactions: readonly number[];
  /** Conservation laws by rows. */
  readonly laws: readonly (readonly number[])[];
  readonly n: readonly (readonly number[])[];
  readonly b: readonly (readonly number[])[];
}

function squareSystem(context: TheoremContext): SquareSystem | null {
  const { rank } = context;
  if (rank === null || !context.dense || context.species.length > 120) return null;
  const reactions = context.arrows
    .map((_, arrow) => arrow)
    .filter((arrow) => context.terms(context.arrows[arrow]!.from).length > 0);
  return {
    rank,
    species: context.species.map((_, i) => i),
    reactions,
    laws: context.lawBasis.map((law) => law.map(Number)),
    n: context.stoichiometricMatrix.entries.map((row) => reactions.map((arrow) => Number(row[arrow]!))),
    b: reactions.map((arrow) =>
      context.species.map((_, i) => Number(context.coefficients.scaled(context.arrows[arrow]!.from, i))),
    ),
  };
}

/**
 * The sum over all pairs of κ^J h^I det N[I,J] det B[J,I], up to a positive factor: the determinant of N diag(κ) B diag(h)
 * on im N, here as that of the same matrix plus WᵀW, which is positive definite on the complement and 0 on im N.
 */
function weightedSum(system: SquareSystem, kappa: readonly number[], h: readonly number[]): number {
  const m = system.species.length;
  const matrix = Array.from({ length: m }, (_, i) => {
    const row = new Float64Array(m);
    system.n[i]!.forEach((coefficient, j) => {
      const weight = coefficient * kappa[j]!;
      if (weight === 0) return;
      const reactants = system.b[j]!;
      for (let l = 0; l < m; l++) if (reactants[l] !== 0) row[l]! += weight * reactants[l]! * h[l]!;
    });
    for (const law of system.laws) {
      if (law[i] === 0) continue;
      for (let l = 0; l < m; l++) row[l]! += law[i]! * law[l]!;
    }
    return row;
  });
  return signOfDeterminant(matrix);
}

/** By elimination with the largest pivot of each column; 0 where a pivot is lost in rounding. */
function signOfDeterminant(matrix: Float64Array[]): number {
  const size = matrix.length;
  let sign = 1;
  for (let k = 0; k < size; k++) {
    let chosen = k;
    let scale = 0;
    for (let i = k; i < size; i++) {
      scale = Math.max(scale, Math.abs(matrix[i]![k]!));
      if (Math.abs(matrix[i]![k]!) > Math.abs(matrix[chosen]![k]!)) chosen = i;
    }
    const row = matrix[chosen]!;
    const pivot = row[k]!;
    const largest = row.reduce((most, entry) => Math.max(most, Math.abs(entry)), 0);
    if (scale === 0 || Math.abs(pivot) < 1e-13 * largest) return 0;
    if (chosen !== k) {
      matrix[chosen] = matrix[k]!;
      matrix[k] = row;
      sign = -sign;
    }
    if (pivot < 0) sign = -sign;
    for (let i = k + 1; i < size; i++) {
      const factor = matrix[i]![k]! / pivot;
      if (factor === 0) continue;
      for (let j = k + 1; j < size; j++) matrix[i]![j]! -= factor * row[j]!;
    }
  }
  return sign;
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

/** A fixed sequence of numbers in [0, 1) (a linear congruential generator), so that every run is the same. */
function sequence(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 1103515245 + 12345) % 2147483648;
    return state / 2147483648;
  };
}
