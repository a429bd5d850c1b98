import { primitive } from './integers.ts';
import { longTableau, smallTableau } from './tableau.ts';
import type { Tableau } from './tableau.ts';

/** One condition Σ coefficient · variable (= or ≥) right; variables that are not named have coefficient 0. */
export interface LinearCondition {
  readonly terms: readonly (readonly [variable: number, coefficient: bigint])[];
  readonly relation: '=' | '>=';
  readonly right: bigint;
}

/** Conditions on `variables` numbers, each at least 0 unless `free` says otherwise. */
export interface LinearProgramme {
  readonly variables: number;
  readonly free?: (variable: number) => boolean;
  readonly conditions: readonly LinearCondition[];
}

/**
 * The outcome, with its proof.
 *
 * - `feasible`: values / denominator meets every condition.
 * - `infeasible`: integer multipliers y, one per condition, not negative for ≥, with Σ y·terms ≤ 0 in every variable
 *   (= 0 in free ones) and Σ y·right > 0: a contradiction (Farkas 1902).
 * - `unfinished`: the pivot limit was reached; nothing is claimed.
 */
export type LinearOutcome =
  | { readonly kind: 'feasible'; readonly values: bigint[]; readonly denominator: bigint }
  | { readonly kind: 'infeasible'; readonly multipliers: bigint[] }
  | { readonly kind: 'unfinished' };

/** Pivots allowed unless the caller says otherwise; far above what networks of a few hundred arrows need. */
const DEFAULT_PIVOTS = 5000;
/** Pivots without progress after which the rule of Bland takes over, which cannot cycle. */
const PATIENCE = 40;

/**
 * Decides whether conditions can be met, exactly: phase one of the simplex method on integers (Dantzig 1951), largest
 * coefficient first, the smallest index when progress stops (Bland 1977). Deterministic; cost is counted in pivots.
 */
export function solveLinear(programme: LinearProgramme, pivots = DEFAULT_PIVOTS): LinearOutcome {
  const layout = layOut(programme);
  const small = smallRows(programme, layout);
  const outcome = small ? run(smallTableau(small), layout, programme, pivots) : null;
  return (
    outcome ??
    run(longTableau(longRows(programme, layout)), layout, programme, pivots) ?? { kind: 'unfinished' }
  );
}

/** Where everything stands: row 0 the objective, rows 1… the conditions with a right-hand side that is not negative. */
interface Layout {
  /** Columns with the right-hand side, which is the last. */
  readonly width: number;
  readonly basis: readonly number[];
  /** Columns that may enter: those before the artificial ones. */
  readonly real: number;
  readonly negativePart: ReadonlyMap<number, number>;
  /** Per condition: the column of its surplus, −1 for equations. */
  readonly surplus: readonly number[];
  /** Per condition: whether it was multiplied by −1, and its unit column with the cost of that column. */
  readonly units: readonly { readonly column: number; readonly cost: bigint; readonly flipped: boolean }[];
}

function layOut({ variables, free, conditions }: LinearProgramme): Layout {
  const negativePart = new Map<number, number>();
  let columns = variables;
  for (let variable = 0; variable < variables; variable++) {
    if (free?.(variable)) negativePart.set(variable, columns++);
  }
  const surplus = conditions.map((condition) => (condition.relation === '>=' ? columns++ : -1));
  const real = columns;
  const units = conditions.map((condition, i) => {
    // A ≥ condition with right ≤ 0 turns into ≤, and its own surplus column starts the basis.
    const flipped = condition.right < 0n || (condition.right === 0n && condition.relation === '>=');
    const own = condition.relation === '>=' && flipped;
    return { column: own ? surplus[i]! : columns++, cost: own ? 0n : 1n, flipped };
  });
  return { width: columns + 1, basis: units.map(({ column }) => column), real, negativePart, surplus, units };
}

/** The rows in doubles; null where an entry of the start is too large for that. */
function smallRows({ conditions }: LinearProgramme, layout: Layout): Float64Array[] | null {
  const { width, negativePart, surplus, units } = layout;
  const objective = new Float64Array(width);
  for (const { column, cost } of units) objective[column] = Number(cost);
  const rows = [objective];
  let largest = 0;
  for (const [i, { terms, right }] of conditions.entries()) {
    const { column, cost, flipped } = units[i]!;
    const row = new Float64Array(width);
    for (const [variable, coefficient] of terms) {
      const value = flipped ? -Number(coefficient) : Number(coefficient);
      row[variable]! += value;
      const negative = negativePart.get(variable);
      if (negative !== undefined) row[negative]! -= value;
      largest += Math.abs(value);
    }
    if (surplus[i]! >= 0) row[surplus[i]!] = flipped ? 1 : -1;
    row[column] = 1;
    row[width - 1] = flipped ? -Number(right) : Number(right);
    largest += Math.abs(row[width - 1]!);
    if (cost === 1n) for (let k = 0; k < width; k++) if (row[k] !== 0) objective[k]! -= row[k]!;
    rows.push(row);
  }
  // Every sum above is exact when all sizes together are.
  return largest + conditions.length < SAFE ? rows : null;
}

const SAFE = 2 ** 52;

/** The rows on integers of any length. */
function longRows({ conditions }: LinearProgramme, layout: Layout): bigint[][] {
  const { width, negativePart, surplus, units } = layout;
  const objective = Array.from({ length: width }, () => 0n);
  for (const { column, cost } of units) objective[column] = cost;
  const rows = conditions.map(({ terms, right }, i) => {
    const { column, cost, flipped } = units[i]!;
    const sense = flipped ? -1n : 1n;
    const row = Array.from({ length: width }, () => 0n);
    for (const [variable, coefficient] of terms) {
      row[variable]! += sense * coefficient;
      const negative = negativePart.get(variable);
      if (negative !== undefined) row[negative]! -= sense * coefficient;
    }
    if (surplus[i]! >= 0) row[surplus[i]!] = -sense;
    row[column] = 1n;
    row[width - 1] = sense * right;
    if (cost === 1n) row.forEach((entry, k) => (objective[k]! -= entry));
    return row;
  });
  return [objective, ...rows];
}

function run(
  tableau: Tableau,
  layout: Layout,
  programme: LinearProgramme,
  pivots: number,
): LinearOutcome | null {
  const basis = [...layout.basis];
  const last = tableau.columns - 1;
  let stalled = 0;
  for (let count = 0; tableau.sign(0, last) !== 0; count++) {
    const column = entering(tableau, layout.real, stalled >= PATIENCE);
    if (column < 0) return { kind: 'infeasible', multipliers: multipliers(tableau, layout) };
    if (count >= pivots) return { kind: 'unfinished' };
    const row = leaving(tableau, basis, column);
    // The objective of phase one is bounded below, so some row always leaves.
    stalled = tableau.sign(row, last) === 0 ? stalled + 1 : 0;
    if (!tableau.pivot(row, column)) return null;
    basis[row - 1] = column;
  }
  return solution(tableau, basis, layout, programme.variables);
}

function entering(tableau: Tableau, real: number, careful: boolean): number {
  let chosen = -1;
  for (let column = 0; column < real; column++) {
    if (tableau.sign(0, column) >= 0) continue;
    if (chosen < 0 || tableau.compareInRow(0, column, chosen) < 0) chosen = column;
    if (careful) break;
  }
  return chosen;
}

function leaving(tableau: Tableau, basis: readonly number[], column: number): number {
  let chosen = -1;
  for (let row = 1; row < tableau.rows; row++) {
    if (tableau.sign(row, column) <= 0) continue;
    const order = chosen < 0 ? -1 : tableau.compareRatios(row, chosen, column);
    if (order < 0 || (order === 0 && basis[row - 1]! < basis[chosen - 1]!)) chosen = row;
  }
  return chosen;
}

function solution(
  tableau: Tableau,
  basis: readonly number[],
  layout: Layout,
  variables: number,
): LinearOutcome {
  const values = Array.from({ length: variables }, () => 0n);
  const last = tableau.columns - 1;
  const ownerOf = new Map([...layout.negativePart].map(([variable, negative]) => [negative, variable]));
  basis.forEach((column, i) => {
    const variable = column < variables ? column : ownerOf.get(column);
    if (variable === undefined || tableau.sign(i + 1, last) === 0) return;
    const value = tableau.entry(i + 1, last);
    values[variable]! += column < variables ? value : -value;
  });
  return { kind: 'feasible', values, denominator: tableau.denominator() };
}

/** The dual values stand in the objective row under the unit columns: cost − reduced cost. */
function multipliers(tableau: Tableau, layout: Layout): bigint[] {
  const scale = tableau.denominator();
  return primitive(
    layout.units.map(({ column, cost, flipped }) => {
      const value = cost * scale - tableau.entry(0, column);
      return flipped ? -value : value;
    }),
  );
}
