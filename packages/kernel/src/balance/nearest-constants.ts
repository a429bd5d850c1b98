import { elementary } from '@stillroom/shared/expression';
import { toDouble } from '../exact/index.ts';
import { inverse, solveDense } from '../intervals/index.ts';
import type { TheoremContext } from '../theorems/context.ts';

/** Complex-balanced constants near given ones, by name, and the Euclidean length of the change of logarithms. */
export interface NearestConstants {
  readonly constants: Readonly<Record<string, number>>;
  readonly distance: number;
}

/** Steps of the iteration, and the largest violation of ln ∏ K^u = 0 that counts as solved. */
const STEPS = 60;
const SOLVED = 1e-12;
/** Complexes and constants above which nothing is looked for. */
const LARGEST = 150;

/**
 * The least change of the logarithms of the constants after which the network is complex balanced: the point of least
 * norm on the linearised conditions, again and again (Gauss and Newton). Each named constant changes as one, however
 * many arrows it stands on. Null where there are no conditions, values are missing, or the iteration does not settle.
 */
export function nearestConstants(
  context: TheoremContext,
  conditions: readonly (readonly bigint[])[],
  named: readonly NamedShare[],
): NearestConstants | null {
  if (conditions.length === 0 || named.length > LARGEST || context.complexCount > LARGEST) return null;
  const exponents = conditions.map((vector) => vector.map(Number));
  let change = named.map(() => 0);
  for (let step = 0; step < STEPS; step++) {
    const rates = ratesAt(context, named, change);
    const trees = logTreeConstants(context, rates);
    if (trees === null) return null;
    const values = exponents.map((u) =>
      u.reduce((sum, exponent, y) => sum + exponent * trees.logarithms[y]!, 0),
    );
    const matrix = exponents.map((u) => slopesOf(context, u, trees, rates, named, change));
    const target = matrix.map((row, j) =>
      row.reduce((sum, entry, i) => sum + entry * change[i]!, -values[j]!),
    );
    const gram = matrix.map((a) => matrix.map((b) => a.reduce((sum, entry, i) => sum + entry * b[i]!, 0)));
    const weights = solveDense(gram, target);
    if (weights === null) return null;
    const next = change.map((_, i) => matrix.reduce((sum, row, j) => sum + row[i]! * weights[j]!, 0));
    const move = next.reduce((most, value, i) => Math.max(most, Math.abs(value - change[i]!)), 0);
    // Long steps are shortened: the conditions are nearly linear only nearby.
    const factor = move > 2 ? 2 / move : 1;
    change = change.map((value, i) => value + factor * (next[i]! - value));
    if (move < SOLVED && values.every((value) => Math.abs(value) < SOLVED * 100))
      return resultOf(named, change);
  }
  return null;
}

/** The named constants of a network whose values are all known. */
export function namedShares(context: TheoremContext): NamedShare[] {
  const byName = new Map<string, { value: number; shares: { arrow: number; rate: number }[] }>();
  for (const { name, arrow, value } of context.constants.parts) {
    const own = context.network.constants.find((constant) => constant.name === name)?.quantity?.value ?? 0;
    const entry = byName.get(name) ?? { value: own, shares: [] };
    entry.shares.push({ arrow, rate: value === null ? 0 : toDouble(value) });
    byName.set(name, entry);
  }
  return [...byName].map(([name, { value, shares }]) => ({ name, value, shares }));
}

/** One named constant: its value and, for each arrow it stands on, its contribution to the arrow's constant. */
export interface NamedShare {
  readonly name: string;
  readonly value: number;
  readonly shares: readonly { readonly arrow: number; readonly rate: number }[];
}

function resultOf(named: readonly NamedShare[], change: readonly number[]): NearestConstants {
  const constants: Record<string, number> = {};
  named.forEach(({ name, value }, i) => (constants[name] = value * elementary.exp(change[i]!)));
  return { constants, distance: Math.sqrt(change.reduce((sum, value) => sum + value * value, 0)) };
}

function ratesAt(context: TheoremContext, named: readonly NamedShare[], change: readonly number[]): number[] {
  const rates = context.arrows.map(() => 0);
  named.forEach(({ shares }, i) => {
    const factor = elementary.exp(change[i]!);
    for (const { arrow, rate } of shares) rates[arrow]! += rate * factor;
  });
  return rates;
}

interface TreeSolution {
  /** ln K and K by complex, K = 1 at the first complex of each linkage class. */
  readonly logarithms: readonly number[];
  readonly values: readonly number[];
  /** Per linkage class the inverse of A_k without the row and column of its first complex. */
  readonly inverses: readonly (readonly (readonly number[])[])[];
}

/** The positive kernel vector of A_k on each linkage class, in doubles; null where rounding spoils it. */
function logTreeConstants(context: TheoremContext, rates: readonly number[]): TreeSolution | null {
  const values = new Array<number>(context.complexCount).fill(1);
  const inverses: number[][][] = [];
  for (const { complexes } of context.linkageClasses) {
    const matrix = classMatrix(context, complexes, rates);
    const inverted = complexes.length === 1 ? [] : inverse(matrix.slice(1).map((row) => row.slice(1)));
    if (inverted === null) return null;
    inverses.push(inverted);
    inverted.forEach((row, i) => {
      values[complexes[i + 1]!] = row.reduce((sum, entry, k) => sum - entry * matrix[k + 1]![0]!, 0);
    });
  }
  return values.every((value) => value > 0)
    ? { logarithms: values.map(elementary.ln), values, inverses }
    : null;
}

function classMatrix(
  context: TheoremContext,
  complexes: readonly number[],
  rates: readonly number[],
): number[][] {
  const place = new Map(complexes.map((complex, i) => [complex, i]));
  const matrix = complexes.map(() => complexes.map(() => 0));
  context.arrows.forEach(({ from, to }, arrow) => {
    const column = place.get(from);
    if (column === undefined) return;
    matrix[place.get(to)!]![column]! += rates[arrow]!;
    matrix[column]![column]! -= rates[arrow]!;
  });
  return matrix;
}

/**
 * d(Σ u ln K)/d(ln constant) for every named constant. Raising the constant of y → y' moves the kernel vector by z with
 * A_k z = flow · (e_y − e_{y'}); z is 0 at the first complex of the class, which Σ u = 0 on the class allows.
 */
function slopesOf(
  context: TheoremContext,
  u: readonly number[],
  trees: TreeSolution,
  rates: readonly number[],
  named: readonly NamedShare[],
  change: readonly number[],
): number[] {
  const perArrow = context.arrows.map(() => 0);
  context.linkageClasses.forEach(({ complexes }, group) => {
    // Σ_y (u_y / K_y) z_y is a fixed combination of the entries of the right-hand side.
    const weights = complexes.map((complex) => u[complex]! / trees.values[complex]!);
    const sensitivity = complexes.map((_, k) =>
      k === 0 ? 0 : trees.inverses[group]!.reduce((sum, row, i) => sum + weights[i + 1]! * row[k - 1]!, 0),
    );
    const place = new Map(complexes.map((complex, i) => [complex, i]));
    context.arrows.forEach(({ from, to }, arrow) => {
      const source = place.get(from);
      if (source === undefined) return;
      perArrow[arrow] =
        rates[arrow]! * trees.values[from]! * (sensitivity[source]! - sensitivity[place.get(to)!]!);
    });
  });
  return named.map(({ shares }, i) => {
    const factor = elementary.exp(change[i]!);
    return shares.reduce(
      (sum, { arrow, rate }) => sum + (perArrow[arrow]! * rate * factor) / rates[arrow]!,
      0,
    );
  });
}
