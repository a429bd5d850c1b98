import type { Constant, Network, Quantity, Rational } from '@stillroom/shared/network';
import { fromDouble, parseRational, toDouble } from '@stillroom/kernel/exact';

/** What `buildNetwork` may be told; everything left out is absent from the network. */
export interface NetworkOptions {
  /** By arrow in order of writing (backward after forward); numbers are taken exactly, strings are "3/2" or "0.1". */
  readonly constants?: readonly (number | string)[];
  readonly start?: Readonly<Record<string, number | string>>;
  readonly fixed?: Readonly<Record<string, number | string>>;
}

/**
 * A mass-action network from one line, for tests that do not test the notation: "E + S <=> ES; ES -> E + P". Constants
 * are called k1, k2, … in order of writing.
 */
export function buildNetwork(text: string, options: NetworkOptions = {}): Network {
  const species: string[] = [];
  const complexes: Map<number, Rational>[] = [];
  const known = new Map<string, number>();
  const arrows: { from: number; to: number; row: number; partner: number }[] = [];
  const rows = text
    .split(';')
    .map((row) => row.trim())
    .filter((row) => row !== '');
  const complexOf = (side: string): number => {
    const terms = readSide(side, species);
    const key = [...terms]
      .sort(([a], [b]) => a - b)
      .map(([i, c]) => `${i}:${c.numerator}/${c.denominator}`)
      .join();
    const index = known.get(key) ?? known.size;
    if (index === known.size) {
      known.set(key, index);
      complexes.push(terms);
    }
    return index;
  };
  rows.forEach((row, r) => {
    const reversible = row.includes('<=>');
    const [left, right] = row.split(reversible ? '<=>' : '->');
    const from = complexOf(left!);
    const to = complexOf(right!);
    const next = arrows.length;
    arrows.push({ from, to, row: r, partner: reversible ? next + 1 : -1 });
    if (reversible) arrows.push({ from: to, to: from, row: r, partner: next });
  });
  const amounts = (given: Readonly<Record<string, number | string>> = {}): Map<number, Quantity> =>
    new Map(Object.entries(given).map(([name, value]) => [species.indexOf(name), quantity(value)]));
  return {
    species,
    complexes: table(complexes),
    reactions: {
      count: arrows.length,
      from: Int32Array.from(arrows, (arrow) => arrow.from),
      to: Int32Array.from(arrows, (arrow) => arrow.to),
      row: Int32Array.from(arrows, (arrow) => arrow.row),
      constant: Int32Array.from(arrows, (_, i) => i),
      law: new Int32Array(arrows.length).fill(-1),
      partner: Int32Array.from(arrows, (arrow) => arrow.partner),
    },
    rows: rows.map((row, r) => ({
      line: r + 1,
      note: '',
      reactions: row.includes('<=>') ? 2 : 1,
      family: false,
    })),
    constants: arrows.map((arrow, i): Constant => ({
      name: `k${i + 1}`,
      quantity: options.constants?.[i] === undefined ? null : quantity(options.constants[i]),
      unit: null,
      line: arrow.row + 1,
    })),
    laws: [],
    start: amounts(options.start),
    fixed: amounts(options.fixed),
    outputs: [],
    weights: new Map(),
    events: [],
    rateRules: new Map(),
    compartments: [],
    units: { time: null, amount: null, volume: null },
  };
}

function readSide(side: string, species: string[]): Map<number, Rational> {
  const terms = new Map<number, Rational>();
  if (side.trim() === '0') return terms;
  for (const part of side.split('+')) {
    const [, coefficient, name] = /^\s*([\d./]*)\s*([A-Za-z]\w*)\s*$/.exec(part) ?? [];
    if (name === undefined) throw new Error(`"${part}" is not a term.`);
    if (!species.includes(name)) species.push(name);
    const index = species.indexOf(name);
    const amount = coefficient === '' ? parseRational('1') : parseRational(coefficient!);
    if (amount === null || terms.has(index)) throw new Error(`"${side}" is not a complex.`);
    terms.set(index, amount);
  }
  return terms;
}

function table(complexes: readonly ReadonlyMap<number, Rational>[]): Network['complexes'] {
  const sorted = complexes.map((terms) => [...terms].sort(([a], [b]) => a - b));
  const flat = sorted.flat();
  const offsets = [0];
  for (const terms of sorted) offsets.push(offsets.at(-1)! + terms.length);
  return {
    count: complexes.length,
    offsets: Int32Array.from(offsets),
    species: Int32Array.from(flat, ([i]) => i),
    numerators: Float64Array.from(flat, ([, c]) => Number(c.numerator)),
    denominators: flat.every(([, c]) => c.denominator === 1n)
      ? null
      : Float64Array.from(flat, ([, c]) => Number(c.denominator)),
  };
}

function quantity(value: number | string): Quantity {
  const exact = typeof value === 'number' ? fromDouble(value) : parseRational(value);
  if (exact === null) throw new Error(`"${value}" is not a number.`);
  return { value: toDouble(exact), exact };
}
