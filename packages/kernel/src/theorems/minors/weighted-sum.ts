import type { TheoremContext } from '../context.ts';

/** A species with its integer coefficient. */
interface Entry {
  readonly species: number;
  readonly amount: number;
}

/** The matrices of a network for `weightedSum`, reactions without reactant left out. */
export interface SquareSystem {
  readonly rank: number;
  readonly species: readonly number[];
  /** Arrows that have a reactant. */
  readonly reactions: readonly number[];
  /** Column of N and row of B of each of them. */
  readonly changes: readonly (readonly Entry[])[];
  readonly reactants: readonly (readonly Entry[])[];
  /** WᵀW by rows, W the conservation laws. */
  readonly complement: readonly Float64Array[];
}

/** Species above which determinants in doubles are not worth trusting. */
const MOST_SPECIES = 120;

/** The matrices of a network; null where it is too large. */
export function squareSystem(context: TheoremContext): SquareSystem | null {
  const { rank } = context;
  if (rank === null || !context.dense || context.species.length > MOST_SPECIES) return null;
  const reactions = context.arrows
    .map((_, arrow) => arrow)
    .filter((arrow) => context.terms(context.arrows[arrow]!.from).length > 0);
  const entries = (amounts: Iterable<readonly [number, bigint]>): Entry[] =>
    [...amounts].map(([species, amount]) => ({ species, amount: Number(amount) }));
  const laws = context.lawBasis.map((law) => law.map(Number));
  return {
    rank,
    species: context.species.map((_, i) => i),
    reactions,
    changes: reactions.map((arrow) => {
      const { from, to } = context.arrows[arrow]!;
      return entries(context.coefficients.change(from, to));
    }),
    reactants: reactions.map((arrow) => {
      const { from } = context.arrows[arrow]!;
      return entries(
        context
          .terms(from)
          .map(({ species }) => [species, context.coefficients.scaled(from, species)] as const),
      );
    }),
    complement: context.species.map((_, i) =>
      Float64Array.from(context.species, (_unused, l) =>
        laws.reduce((sum, law) => sum + law[i]! * law[l]!, 0),
      ),
    ),
  };
}

/**
 * The sign of the sum over all pairs of κ^J h^I det N[I,J] det B[J,I]: that of the determinant of N diag(κ) B diag(h) on
 * im N, here of the same matrix plus WᵀW, which is positive definite on the complement and 0 on im N.
 */
export function weightedSum(system: SquareSystem, kappa: readonly number[], h: readonly number[]): number {
  const matrix = system.complement.map((row) => row.slice());
  system.changes.forEach((change, j) => {
    const weight = kappa[j]!;
    if (weight === 0) return;
    for (const { species: column, amount } of system.reactants[j]!) {
      const entry = weight * amount * h[column]!;
      if (entry === 0) continue;
      for (const { species: row, amount: step } of change) matrix[row]![column]! += step * entry;
    }
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
