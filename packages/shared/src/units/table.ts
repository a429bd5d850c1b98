import { rational } from '../network/index.ts';
import type { Rational } from '../network/network.ts';

/** The kinds of thing a unit counts, each a dimension of its own. */
export const dimensionNames = ['time', 'length', 'mass', 'mol', 'individuals', 'molecules', 'cells'] as const;
export type DimensionName = (typeof dimensionNames)[number];
/** The power of each dimension, in the order of `dimensionNames`. */
export type Dimension = readonly number[];

/** Avogadro's number, molecules in a mol: exact since 2019 (SI Brochure, 9th edition). */
export const avogadro = 602214076000000000000000n;

interface BaseUnit {
  readonly dimension: Dimension;
  /** In s, m, g, mol, individuals, molecules, cells. */
  readonly scale: Rational;
  readonly prefixes: boolean;
}

/** A symbol of the table with its prefix resolved. */
export interface UnitSymbol {
  readonly symbol: string;
  readonly dimension: Dimension;
  readonly scale: Rational;
}

const dimension = (powers: Partial<Record<DimensionName, number>>): Dimension =>
  dimensionNames.map((name) => powers[name] ?? 0);
const seconds = (count: number) => rational.ofInteger(count);

const baseUnits: Readonly<Record<string, BaseUnit>> = {
  s: { dimension: dimension({ time: 1 }), scale: rational.one, prefixes: true },
  min: { dimension: dimension({ time: 1 }), scale: seconds(60), prefixes: false },
  h: { dimension: dimension({ time: 1 }), scale: seconds(3600), prefixes: false },
  d: { dimension: dimension({ time: 1 }), scale: seconds(86400), prefixes: false },
  m: { dimension: dimension({ length: 1 }), scale: rational.one, prefixes: true },
  L: { dimension: dimension({ length: 3 }), scale: rational.quotient(1n, 1000n), prefixes: true },
  g: { dimension: dimension({ mass: 1 }), scale: rational.one, prefixes: true },
  mol: { dimension: dimension({ mol: 1 }), scale: rational.one, prefixes: true },
  M: { dimension: dimension({ mol: 1, length: -3 }), scale: rational.ofInteger(1000), prefixes: true },
  individuals: { dimension: dimension({ individuals: 1 }), scale: rational.one, prefixes: false },
  molecules: { dimension: dimension({ molecules: 1 }), scale: rational.one, prefixes: false },
  cells: { dimension: dimension({ cells: 1 }), scale: rational.one, prefixes: false },
};

/** Power of ten of each metric prefix. */
const prefixes: Readonly<Record<string, number>> = {
  Y: 24,
  Z: 21,
  E: 18,
  P: 15,
  T: 12,
  G: 9,
  M: 6,
  k: 3,
  h: 2,
  da: 1,
  d: -1,
  c: -2,
  m: -3,
  u: -6,
  n: -9,
  p: -12,
  f: -15,
  a: -18,
  z: -21,
  y: -24,
};

/** Symbols that are commonly meant, for completion and for "did you mean". */
export const commonSymbols: readonly string[] = [
  ...[
    's',
    'ms',
    'us',
    'min',
    'h',
    'd',
    'M',
    'mM',
    'uM',
    'nM',
    'pM',
    'mol',
    'mmol',
    'umol',
    'L',
    'mL',
    'uL',
    'fL',
    'pL',
  ],
  ...['m', 'cm', 'mm', 'um', 'g', 'kg', 'mg', 'individuals', 'molecules', 'cells'],
];

function buildSymbols(): Map<string, UnitSymbol> {
  const symbols = new Map<string, UnitSymbol>();
  for (const [symbol, unit] of Object.entries(baseUnits)) symbols.set(symbol, { ...unit, symbol });
  for (const [base, unit] of Object.entries(baseUnits)) {
    if (!unit.prefixes) continue;
    for (const [prefix, exponent] of Object.entries(prefixes)) {
      const symbol = prefix + base;
      // A unit of its own goes first: `min` is a minute and `d` a day.
      if (symbols.has(symbol)) continue;
      const scale = rational.multiply(unit.scale, rational.power(rational.ofInteger(10), exponent));
      symbols.set(symbol, { symbol, dimension: unit.dimension, scale });
    }
  }
  return symbols;
}

const symbols = buildSymbols();

/** The unit that a word names, `µ` (micro sign) and `μ` (Greek mu) read as `u`; null where it is none. */
export function findSymbol(word: string): UnitSymbol | null {
  const first = word.charCodeAt(0);
  const spelt = first === 0xb5 || first === 0x3bc ? `u${word.slice(1)}` : word;
  return symbols.get(spelt) ?? null;
}
