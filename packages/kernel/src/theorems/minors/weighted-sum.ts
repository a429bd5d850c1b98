import type { TheoremContext } from '../context.ts';

/** Matrices of a network for `weightedSum`. */
export interface SquareSystem {
  readonly rank: number;
  readonly species: readonly number[];
  readonly reactions: readonly number[];
  /** Conservation laws by rows. */
  readonly laws: readonly (readonly number[])[];
  readonly n: readonly (readonly number[])[];
  readonly b: readonly (readonly number[])[];
}

/** The matrices of a network, reactions without reactant left out; null where it is too large. */
export function squareSystem(context: TheoremContext): SquareSystem | null {
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
export function weightedSum(system: SquareSystem, kappa: readonly number[], h: readonly number[]): number {
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
