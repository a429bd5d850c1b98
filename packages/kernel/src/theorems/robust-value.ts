import type { Rational } from '../exact/index.ts';
import {
  add,
  clearDenominators,
  divide,
  formatRational,
  isZero,
  matrixOfRows,
  rational,
  sign,
  solve,
  ZERO,
} from '../exact/index.ts';
import type { TheoremContext } from './context.ts';
import type { RobustPair } from './robust-pairs.ts';

/** Non-terminal complexes above which no value is worked out. */
const LARGEST_BLOCK = 120;

/**
 * The robust concentration of a pair for the constants of the text, as an exact number or root; 'none' where these
 * constants admit no positive steady state; null where a constant is missing or not rational.
 *
 * At a positive steady state A_k Ψ(x) is a multiple of the g that spans ker Y ∩ im I_a, so on the non-terminal complexes
 * Ψ(x) is a multiple of the solution v of A_k v = g there, and x_A^(y'_A − y_A) = v_{y'} / v_y.
 */
export function robustValue(context: TheoremContext, pair: RobustPair): string | 'none' | null {
  const v = nonterminalSolution(context);
  if (v === null) return null;
  const lower = v.get(pair.lower)!;
  const upper = v.get(pair.upper)!;
  if (isZero(lower) || isZero(upper) || sign(lower) !== sign(upper)) return 'none';
  const ratio = formatRational(divide(upper, lower));
  const order = context.coefficient(pair.upper, pair.species) - context.coefficient(pair.lower, pair.species);
  return order === 1 ? ratio : `(${ratio})^(1/${order})`;
}

function nonterminalSolution(context: TheoremContext): ReadonlyMap<number, Rational> | null {
  return context.memo('non-terminal solution', () => {
    const complexes = context.nonterminalComplexes;
    const constants = context.exactConstants;
    const g = context.deficiencyVectors?.[0];
    if (constants === null || g === undefined || complexes.length > LARGEST_BLOCK) return null;
    const place = new Map(complexes.map((complex, i) => [complex, i]));
    const block: Rational[][] = complexes.map(() => complexes.map(() => ZERO));
    context.arrows.forEach(({ from, to }, arrow) => {
      const column = place.get(from);
      if (column === undefined) return;
      const rate = constants[arrow]!;
      const row = place.get(to);
      if (row !== undefined) block[row]![column] = add(block[row]![column]!, rate);
      block[column]![column] = add(block[column]![column]!, rational(-rate.numerator, rate.denominator));
    });
    const scaled = block.map((row, i) => clearDenominators([...row, rational(g[complexes[i]!]!)]).integers);
    const solution = solve(
      matrixOfRows(
        scaled.map((row) => row.slice(0, -1)),
        complexes.length,
      ),
      scaled.map((row) => row.at(-1)!),
    );
    return solution && new Map(complexes.map((complex, i) => [complex, solution[i]!]));
  });
}
