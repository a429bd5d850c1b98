import type { SparseColumns } from '../exact/index.ts';
import { CellFailure } from '../engine/failure.ts';
import type { StructuralNetwork } from './structural-network.ts';

/** The stoichiometric matrix N, one column per arrow: column j of N is column j of `matrix` divided by `scale[j]`. */
export interface Stoichiometry {
  readonly matrix: SparseColumns;
  /** The least common denominator of each column; null where all coefficients are integers. */
  readonly scale: Float64Array | null;
}

/**
 * N = Y·I_a of the structural network: column j is product complex minus reactant complex of arrow j. `arrows` picks
 * some of them (all by default). Columns with rational coefficients are scaled to integers, which changes neither rank
 * nor left kernel.
 */
export function stoichiometry(network: StructuralNetwork, arrows?: Int32Array): Stoichiometry {
  const { complexes } = network;
  const count = arrows?.length ?? network.arrows.count;
  const offsets = new Int32Array(count + 1);
  let capacity = 0;
  for (let j = 0; j < count; j++) {
    const arrow = arrows ? arrows[j]! : j;
    capacity += size(network, network.arrows.from[arrow]!) + size(network, network.arrows.to[arrow]!);
  }
  const rows = new Int32Array(capacity);
  const values = new Float64Array(capacity);
  const scale = complexes.denominators ? new Float64Array(count).fill(1) : null;
  let end = 0;
  for (let j = 0; j < count; j++) {
    const arrow = arrows ? arrows[j]! : j;
    const from = network.arrows.from[arrow]!;
    const to = network.arrows.to[arrow]!;
    if (scale) scale[j] = commonDenominator(network, from, to);
    const factor = scale ? scale[j]! : 1;
    let a = complexes.offsets[from]!;
    let b = complexes.offsets[to]!;
    const endA = complexes.offsets[from + 1]!;
    const endB = complexes.offsets[to + 1]!;
    while (a < endA || b < endB) {
      const speciesA = a < endA ? complexes.species[a]! : Infinity;
      const speciesB = b < endB ? complexes.species[b]! : Infinity;
      let value = 0;
      if (speciesB <= speciesA) value += scaled(network, b++, factor);
      if (speciesA <= speciesB) value -= scaled(network, a++, factor);
      if (value === 0) continue;
      rows[end] = Math.min(speciesA, speciesB);
      values[end++] = value;
    }
    offsets[j + 1] = end;
  }
  const matrix: SparseColumns = {
    rowCount: network.species.length,
    columnCount: count,
    offsets,
    rows: rows.subarray(0, end),
    values: values.subarray(0, end),
  };
  return { matrix, scale };
}

/** One arrow of each opposite pair: their columns differ in sign only, so rank and left kernel need one of them. */
export function oneArrowOfEachPair(network: StructuralNetwork): Int32Array {
  const { count, reverse } = network.arrows;
  const chosen = new Int32Array(count);
  let end = 0;
  for (let arrow = 0; arrow < count; arrow++) {
    if (reverse[arrow]! < 0 || reverse[arrow]! > arrow) chosen[end++] = arrow;
  }
  return chosen.subarray(0, end);
}

function size(network: StructuralNetwork, complex: number): number {
  return network.complexes.offsets[complex + 1]! - network.complexes.offsets[complex]!;
}

function scaled(network: StructuralNetwork, term: number, factor: number): number {
  const { numerators, denominators } = network.complexes;
  const value = denominators ? numerators[term]! * (factor / denominators[term]!) : numerators[term]!;
  if (!Number.isSafeInteger(value)) {
    throw new CellFailure(
      'The fractions of a reaction have a common denominator too large for exact structure (beyond 2^53).',
      { hint: 'Write the reaction with smaller whole numbers.' },
    );
  }
  return value;
}

function commonDenominator(network: StructuralNetwork, from: number, to: number): number {
  const { offsets, denominators } = network.complexes;
  let common = 1;
  for (const complex of [from, to]) {
    for (let k = offsets[complex]!; k < offsets[complex + 1]!; k++) {
      const denominator = denominators![k]!;
      common = (common / greatestCommonDivisor(common, denominator)) * denominator;
      if (!Number.isSafeInteger(common)) common = Number.MAX_VALUE;
    }
  }
  return common;
}

function greatestCommonDivisor(a: number, b: number): number {
  let x = a;
  let y = b;
  while (y !== 0) [x, y] = [y, x % y];
  return x;
}
