import type { Rational } from '@stillroom/shared/network';
import { echelon } from './echelon.ts';
import { primitive } from './integers.ts';
import type { IntegerMatrix } from './matrix.ts';
import { matrixOfRows, transpose } from './matrix.ts';
import { rational, ZERO } from './rational.ts';

/**
 * A basis of { v : matrix · v = 0 }, one primitive integer vector for each column without pivot, in the order of those
 * columns, positive there. A basis of the rational space; for a basis of the lattice see `integerKernel`.
 */
export function rightNullspace(matrix: IntegerMatrix): bigint[][] {
  const form = echelon(matrix);
  const pivotOf = new Map(form.pivotColumns.map((column, k) => [column, k]));
  const basis: bigint[][] = [];
  for (let free = 0; free < matrix.columns; free++) {
    if (pivotOf.has(free)) continue;
    const vector = Array.from({ length: matrix.columns }, () => 0n);
    const scale = form.pivot < 0n ? -1n : 1n;
    vector[free] = form.pivot * scale;
    form.pivotColumns.forEach((column, k) => {
      vector[column] = -form.rows[k]![free]! * scale;
    });
    basis.push(primitive(vector));
  }
  return basis;
}

/** A basis of { w : w · matrix = 0 }, as `rightNullspace` of the transpose. */
export function leftNullspace(matrix: IntegerMatrix): bigint[][] {
  return rightNullspace(transpose(matrix));
}

/**
 * One rational solution x of matrix · x = right (0 in the columns without pivot), or null where there is none.
 */
export function solve(matrix: IntegerMatrix, right: readonly bigint[]): Rational[] | null {
  if (right.length !== matrix.rows) throw new RangeError('The right-hand side needs one entry per row.');
  const augmented = matrixOfRows(
    matrix.entries.map((row, i) => [...row, right[i]!]),
    matrix.columns + 1,
  );
  const form = echelon(augmented);
  if (form.pivotColumns.at(-1) === matrix.columns) return null;
  const solution: Rational[] = Array.from({ length: matrix.columns }, () => ZERO);
  form.pivotColumns.forEach((column, k) => {
    solution[column] = rational(form.rows[k]![matrix.columns]!, form.pivot);
  });
  return solution;
}
