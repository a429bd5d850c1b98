import type { ExactNumber, MatrixTable, StructureMatrices } from '@stillroom/shared/cells';
import { rational, rationalForResult } from '../exact/index.ts';
import { coefficientLabel } from '../network/index.ts';
import type { StructuralNetwork } from '../network/index.ts';
import { constantOf } from './structure-lists.ts';
import { nameTex } from './tex.ts';

/** Networks with more species, complexes or arrows than this have no matrix tables. */
const LARGEST = { species: 40, complexes: 40, arrows: 80 } as const;

/** A term of an entry: a number, or a constant times powers of fixed species, as text and typeset. */
interface Entry {
  readonly value: ExactNumber;
  readonly tex: string;
}

/** Y, I_a, N and A_k of a network small enough to be read as tables; null for larger ones. */
export function structureMatrices(
  network: StructuralNetwork,
  labels: readonly string[],
): StructureMatrices | null {
  const { species, arrows, complexes } = network;
  if (
    species.length > LARGEST.species ||
    complexes.count > LARGEST.complexes ||
    arrows.count > LARGEST.arrows
  ) {
    return null;
  }
  const names = Array.from(
    { length: arrows.count },
    (_, arrow) => `${labels[arrows.from[arrow]!]} -> ${labels[arrows.to[arrow]!]}`,
  );
  const kinetic = kineticEntries(network);
  return {
    Y: table(species, labels, (i, complex) => number(coefficient(network, complex, i))),
    Ia: table(labels, names, (complex, arrow) =>
      number(Number(arrows.to[arrow] === complex) - Number(arrows.from[arrow] === complex)),
    ),
    N: table(species, names, (i, arrow) => number(netCoefficient(network, arrow, i))),
    ...(kinetic === null ? {} : { Ak: table(labels, labels, (to, from) => kinetic[to]![from]!) }),
  };
}

function table(
  rows: readonly string[],
  columns: readonly string[],
  entry: (row: number, column: number) => Entry,
): MatrixTable {
  const cells = rows.map((_, row) => columns.map((_unused, column) => entry(row, column)));
  const lines = cells.map((line) => line.map(({ tex }) => tex).join(' & '));
  // pmatrix stops at ten columns.
  const tex = `\\left(\\begin{array}{${'c'.repeat(columns.length)}}${lines.join(' \\\\ ')}\\end{array}\\right)`;
  return { rows, columns, entries: cells.map((line) => line.map(({ value }) => value)), tex };
}

function number(value: ExactNumber): Entry {
  const text = String(value);
  const fraction = /^(-?)(\d+)\/(\d+)$/.exec(text);
  const tex = fraction ? `${fraction[1]}\\tfrac{${fraction[2]}}{${fraction[3]}}` : text;
  return { value, tex };
}

/** Coefficient of a species in a complex as a fraction of safe integers. */
function fractionAt(network: StructuralNetwork, complex: number, species: number): [number, number] {
  const { complexes } = network;
  for (let k = complexes.offsets[complex]!; k < complexes.offsets[complex + 1]!; k++) {
    if (complexes.species[k] === species) {
      return [complexes.numerators[k]!, complexes.denominators?.[k] ?? 1];
    }
  }
  return [0, 1];
}

function coefficient(network: StructuralNetwork, complex: number, species: number): ExactNumber {
  const [numerator, denominator] = fractionAt(network, complex, species);
  return denominator === 1 ? numerator : coefficientLabel(numerator, denominator);
}

function netCoefficient(network: StructuralNetwork, arrow: number, species: number): ExactNumber {
  const [a, b] = fractionAt(network, network.arrows.to[arrow]!, species).map(BigInt) as [bigint, bigint];
  const [c, d] = fractionAt(network, network.arrows.from[arrow]!, species).map(BigInt) as [bigint, bigint];
  return rationalForResult(rational(a * d - c * b, b * d));
}

/** A_k by target and source complex: constants of the arrows, minus what leaves on the diagonal; null unless mass action. */
function kineticEntries(network: StructuralNetwork): Entry[][] | null {
  const { complexes, reactions } = network;
  const terms: string[][][] = Array.from({ length: complexes.count }, () =>
    Array.from({ length: complexes.count }, () => []),
  );
  const typeset: string[][][] = terms.map((row) => row.map(() => []));
  for (let reaction = 0; reaction < reactions.count; reaction++) {
    const rate = rateFactor(network, reaction);
    if (rate === null) return null;
    const from = reactions.from[reaction]!;
    const to = reactions.to[reaction]!;
    terms[to]![from]!.push(rate.text);
    typeset[to]![from]!.push(rate.tex);
    terms[from]![from]!.push(rate.text);
    typeset[from]![from]!.push(rate.tex);
  }
  return terms.map((row, to) =>
    row.map((sum, from) => {
      if (sum.length === 0) return number(0);
      const join = (parts: readonly string[]) =>
        to === from
          ? parts
              .map((part) => `-${part}`)
              .join(' ')
              .replaceAll(' -', ' - ')
          : parts.join(' + ');
      return { value: join(sum), tex: join(typeset[to]![from]!) };
    }),
  );
}

/** Constant of a reaction times the fixed species it takes: "k1*X^2". */
function rateFactor(network: StructuralNetwork, reaction: number): { text: string; tex: string } | null {
  const constant = constantOf(network, reaction);
  if (constant === null) return null;
  const { source } = network;
  const name = source.constants[constant]!.name;
  const text = [name];
  const tex = [nameTex(name)];
  const complex = source.reactions.from[network.reactions.source[reaction]!]!;
  const { offsets, species, numerators, denominators } = source.complexes;
  for (let k = offsets[complex]!; k < offsets[complex + 1]!; k++) {
    if (!source.fixed.has(species[k]!)) continue;
    const power = coefficientLabel(numerators[k]!, denominators?.[k] ?? 1);
    const fixed = source.species[species[k]!]!;
    text.push(power === '1' ? fixed : `${fixed}^${power.includes('/') ? `(${power})` : power}`);
    tex.push(power === '1' ? nameTex(fixed) : `{${nameTex(fixed)}}^{${power}}`);
  }
  return { text: text.join('*'), tex: tex.join(' \\, ') };
}
