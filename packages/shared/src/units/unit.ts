import { rational } from '../network/index.ts';
import type { Rational } from '../network/network.ts';
import { dimensionNames, findSymbol } from './table.ts';
import type { Dimension } from './table.ts';

export interface UnitFactor {
  /** A symbol of the table with its prefix, `u` for micro: "uM". */
  readonly symbol: string;
  /** An integer that is not 0. */
  readonly power: number;
}

/** A product of powers of symbols. Factors with positive power stand first. The empty product is a pure number. */
export type Unit = readonly UnitFactor[];

/** A unit in the order in which units are kept and printed: positive powers first, else as given. */
export function unitOf(factors: readonly UnitFactor[]): Unit {
  const ordered = factors.every((f, i) => i === 0 || f.power < 0 || (factors[i - 1]?.power ?? 0) > 0);
  if (ordered) return factors;
  return [...factors.filter((f) => f.power > 0), ...factors.filter((f) => f.power < 0)];
}

/** Prints a unit as it is read: "uM/s", "/uM/s", "m^2/s"; "" for a pure number. */
export function printUnit(unit: Unit): string {
  let text = '';
  for (const { symbol, power } of unitOf(unit)) {
    const size = Math.abs(power);
    const printed = size === 1 ? symbol : `${symbol}^${size}`;
    if (power < 0) text += `/${printed}`;
    else text += text === '' ? printed : ` ${printed}`;
  }
  return text;
}

/** The powers of time, length, mass, mol, individuals, molecules and cells in a unit. */
export function dimensionOf(unit: Unit): Dimension {
  const powers = dimensionNames.map(() => 0);
  for (const { symbol, power } of unit) {
    const of = findSymbol(symbol)?.dimension ?? [];
    of.forEach((value, i) => (powers[i] = (powers[i] ?? 0) + value * power));
  }
  return powers;
}

/** How many of the base units s, m, g, mol, individuals, molecules and cells a unit is, exactly. */
export function scaleOf(unit: Unit): Rational {
  let scale = rational.one;
  for (const { symbol, power } of unit) {
    const of = findSymbol(symbol);
    if (of) scale = rational.multiply(scale, rational.power(of.scale, power));
  }
  return scale;
}

export function sameDimension(a: Dimension, b: Dimension): boolean {
  return dimensionNames.every((_, i) => (a[i] ?? 0) === (b[i] ?? 0));
}

/** The exact factor that turns a value in `from` into a value in `to`; null where their dimensions differ. */
export function conversionFactor(from: Unit, to: Unit): Rational | null {
  if (!sameDimension(dimensionOf(from), dimensionOf(to))) return null;
  return rational.divide(scaleOf(from), scaleOf(to));
}

/** A unit raised to an integer power. */
export function unitPower(unit: Unit, power: number): Unit {
  if (power === 0) return [];
  return unitOf(unit.map((f) => ({ symbol: f.symbol, power: f.power * power })));
}

/** The product of two units; powers of one symbol are gathered. */
export function unitProduct(a: Unit, b: Unit): Unit {
  const powers = new Map<string, number>();
  for (const { symbol, power } of [...a, ...b]) powers.set(symbol, (powers.get(symbol) ?? 0) + power);
  return unitOf([...powers].filter(([, power]) => power !== 0).map(([symbol, power]) => ({ symbol, power })));
}
