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
  const small = smallTableau(layout.rows);
  const outcome = small ? run(small, layout, programme, pivots) : null;
  return outcome ?? run(longTableau(layout.rows), layout, programme, pivots) ?? { kind: 'unfinished' };
}

/** Where everything stands: row 0 the objective, rows 1… the conditions with a right-hand side that is not negative. */
interface Layout {
  readonly rows: bigint[][];
  readonly basis: number[];
  /** Columns that may enter: those before the artificial ones. */
  readonly real: number;
  readonly negativePart: ReadonlyMap<number, number>;
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
  // A ≥ condition with right ≤ 0 turns into ≤, and its own surplus column starts the basis.
  const flipped = conditions.map(
    (condition) => condition.right < 0n || (condition.right === 0n && condition.relation === '>='),
  );
  const units = conditions.map((condition, i) => {
    const own = condition.relation === '>=' && flipped[i]!;
    return { column: own ? surplus[i]! : columns++, cost: own ? 0n : 1n, flipped: flipped[i]! };
  });
  const width = columns + 1;
  const objective = Array.from({ length: width }, () => 0n);
  for (const unit of units) objective[unit.column] = unit.cost;
  const rows = conditions.map((condition, i) => {
    const row = Array.from({ length: width }, () => 0n);
    const sense = flipped[i]! ? -1n : 1n;
    for (const [variable, coefficient] of condition.terms) {
      row[variable]! += sense * coefficient;
      const negative = negativePart.get(variable);
      if (negative !== undefined) row[negative]! -= sense * coefficient;
    }
    if (surplus[i]! >= 0) row[surplus[i]!] = -sense;
    row[units[i]!.column] = 1n;
    row[width - 1] = sense * condition.right;
    if (units[i]!.cost === 1n) row.forEach((entry, k) => (objective[k]! -= entry));
    return row;
  });
  return { rows: [objective, ...rows], basis: units.map((unit) => unit.column), real, negativePart, units };
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
  const all = Array.from({ length: tableau.columns }, () => 0n);
  basis.forEach((column, i) => (all[column] = tableau.entry(i + 1, tableau.columns - 1)));
  const values = all.slice(0, variables);
  for (const [variable, negative] of layout.negativePart) values[variable]! -= all[negative]!;
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
