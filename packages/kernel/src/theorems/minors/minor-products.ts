import type { MinorPair } from '@stillroom/shared/cells';
import { integerForResult } from '../../exact/index.ts';
import type { TheoremContext } from '../context.ts';
import { smallDeterminant } from './small-determinant.ts';

/** How many products det N[I,J] · det B[J,I] are positive and negative, with one example of each. */
export interface MinorProducts {
  readonly positive: number;
  readonly negative: number;
  readonly examples: readonly MinorPair[];
}

/** Species and arrows of a pair (I, J), ascending. */
export interface MinorIndices {
  readonly species: readonly number[];
  readonly arrows: readonly number[];
}

/** Species are kept as bits of one number. */
const MOST_SPECIES = 30;

/**
 * Goes through every pair (I, J) with |I| = |J| = s and det B[J,I] ≠ 0, B the reactant matrix. Arrows with equal reactant
 * complex and parallel change of one sense are one. Null where the list
 * would take more than `steps` partial choices of reactions or of species for them.
 */
export function minorProducts(context: TheoremContext, steps: number): MinorProducts | null {
  if (!listable(context)) return null;
  let positive = 0;
  let negative = 0;
  const examples = new Map<number, MinorPair>();
  const complete = visitMinorProducts(context, independentArrows(context), steps, (indices, product) => {
    const sign = product > 0n ? 1 : -1;
    if (sign > 0) positive++;
    else negative++;
    if (!examples.has(sign)) examples.set(sign, minorPair(context, indices));
    return true;
  });
  return complete ? { positive, negative, examples: [...examples.values()] } : null;
}

function listable(context: TheoremContext): boolean {
  return context.rank !== null && context.species.length <= MOST_SPECIES && context.dense;
}

/** Entries of a column that are reduced in the time of one step of the list. */
const ENTRIES_PER_STEP = 100;

/** Called with a pair (I, J) and its product, which is not 0; false ends the list. */
export type ProductVisitor = (indices: MinorIndices, product: bigint) => boolean;

/**
 * Lists the pairs (I, J), J among the given arrows, whose product is not 0. False where the list would take more than
 * `steps` partial choices, numbers outgrow doubles, the network is too large, or the visitor ended it.
 */
export function visitMinorProducts(
  context: TheoremContext,
  arrows: readonly number[],
  steps: number,
  visit: ProductVisitor,
): boolean {
  const { rank } = context;
  if (rank === null || !listable(context)) return false;
  const chosen: number[] = [];
  let left = steps;
  const choose = (from: number, echelonRows: Reduced[]): boolean => {
    left -= 1 + (echelonRows.length * context.species.length) / ENTRIES_PER_STEP;
    if (left < 0) return false;
    if (chosen.length === rank) {
      left = addProducts(context, [...chosen], visit, left);
      return left >= 0;
    }
    for (let k = from; k <= arrows.length - (rank - chosen.length); k++) {
      const reduced = reduceBy(echelonRows, columnOf(context, arrows[k]!));
      if (reduced === undefined) return false;
      if (reduced === null) continue;
      chosen.push(arrows[k]!);
      const complete = choose(k + 1, [...echelonRows, reduced]);
      chosen.pop();
      if (!complete) return false;
    }
    return true;
  };
  return choose(0, []);
}

/** The pair as a witness, with both determinants worked out. */
export function minorPair(context: TheoremContext, { species, arrows }: MinorIndices): MinorPair {
  return {
    species: context.speciesNames(species),
    reactions: arrows.map((arrow) => context.reactionOf(arrow)),
    stoichiometric: integerForResult(stoichiometricMinor(context, { species, arrows })),
    reactant: integerForResult(reactantMinor(context, { species, arrows })),
  };
}

/** det N[I,J] with species measured in their scaled units. */
export function stoichiometricMinor(context: TheoremContext, { species, arrows }: MinorIndices): bigint {
  return smallDeterminant(species.map((i) => arrows.map((arrow) => columnOf(context, arrow)[i]!)));
}

/** det B[J,I] in the same units. */
export function reactantMinor(context: TheoremContext, { species, arrows }: MinorIndices): bigint {
  return smallDeterminant(
    arrows.map((arrow) =>
      species.map((i) => Number(context.coefficients.scaled(context.arrows[arrow]!.from, i))),
    ),
  );
}

/** Arrows that have a reactant, one for each reactant complex and direction of change. */
export function independentArrows(context: TheoremContext): number[] {
  const seen = new Set<string>();
  return context.arrows
    .map((_, arrow) => arrow)
    .filter((arrow) => {
      const { from } = context.arrows[arrow]!;
      if (context.terms(from).length === 0) return false;
      const column = columnOf(context, arrow);
      const common = column.reduce(greatestCommonDivisor, 0);
      const key = `${from}|${column.map((entry) => entry / common).join()}`;
      if (seen.has(key)) return false;
      seen.add(key);
      return true;
    });
}

function columnOf(context: TheoremContext, arrow: number): readonly number[] {
  const columns = context.memo('number columns', () =>
    context.arrows.map((_, j) => context.stoichiometricMatrix.entries.map((row) => Number(row[j]!))),
  );
  return columns[arrow]!;
}

/** A column reduced by earlier ones, with the place of its first entry. */
interface Reduced {
  readonly lead: number;
  readonly entries: Float64Array;
}

/** Entries above which a reduced column is divided by its greatest common divisor, and above which it is given up. */
const LONG_ENTRY = 2 ** 20;
const LONGEST_ENTRY = 2 ** 26;

/** Null where the column depends on the others, undefined where numbers outgrow doubles. */
function reduceBy(rows: readonly Reduced[], column: readonly number[]): Reduced | null | undefined {
  const work = Float64Array.from(column);
  for (const { lead, entries } of rows) {
    const factor = work[lead]!;
    if (factor === 0) continue;
    const pivot = entries[lead]!;
    let largest = 0;
    for (let i = 0; i < work.length; i++) {
      const value = work[i]! * pivot - factor * entries[i]!;
      work[i] = value;
      if (value > largest) largest = value;
      else if (-value > largest) largest = -value;
    }
    if (largest <= LONG_ENTRY) continue;
    const common = work.reduce(greatestCommonDivisor, 0);
    for (let i = 0; i < work.length; i++) work[i]! /= common;
    if (largest / common > LONGEST_ENTRY) return undefined;
  }
  const lead = work.findIndex((entry) => entry !== 0);
  return lead < 0 ? null : { lead, entries: work };
}

/**
 * Visits the products of one J: det B[J,·] is expanded over the ways to give each reaction a reactant of its own. Returns
 * the steps that are left, negative where the list has to end.
 */
function addProducts(
  context: TheoremContext,
  arrows: readonly number[],
  visit: ProductVisitor,
  steps: number,
): number {
  const minors = new Map<number, number>();
  let left = steps;
  const taken: number[] = [];
  const match = (row: number, used: number, product: number): void => {
    if (--left < 0) return;
    if (row === arrows.length) {
      minors.set(used, (minors.get(used) ?? 0) + product);
      return;
    }
    for (const { species } of context.terms(context.arrows[arrows[row]!]!.from)) {
      if (used & (1 << species)) continue;
      const inversions = taken.filter((other) => other > species).length;
      const coefficient = Number(context.coefficients.scaled(context.arrows[arrows[row]!]!.from, species));
      const next = product * coefficient * (inversions % 2 === 0 ? 1 : -1);
      if (Math.abs(next) > LARGEST_PRODUCT) {
        left = -1;
        return;
      }
      taken.push(species);
      match(row + 1, used | (1 << species), next);
      taken.pop();
    }
  };
  match(0, 0, 1);
  if (left < 0) return left;
  for (const [used, reactant] of minors) {
    if (reactant === 0) continue;
    const species = context.species.map((_, i) => i).filter((i) => used & (1 << i));
    const stoichiometric = stoichiometricMinor(context, { species, arrows });
    if (stoichiometric === 0n) continue;
    if (!visit({ species, arrows }, stoichiometric * BigInt(reactant))) return -1;
  }
  return left - minors.size;
}

/** Products of coefficients above which their sums in doubles might not be exact. */
const LARGEST_PRODUCT = 2 ** 40;

function greatestCommonDivisor(a: number, b: number): number {
  let x = Math.abs(a);
  let y = Math.abs(b);
  while (y !== 0) [x, y] = [y, x % y];
  return x;
}
