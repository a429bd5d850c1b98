import { rational } from '../../network/index.ts';
import type { NetworkUnits, Rational } from '../../network/network.ts';
import { walkSyntax } from '../../expression/names.ts';
import type { ExpressionSyntax } from '../../expression/syntax.ts';
import { dimensionNames } from '../../units/table.ts';
import { dimensionOf, printUnit, scaleOf, unitOf, unitPower, unitProduct } from '../../units/unit.ts';
import type { Dimension } from '../../units/table.ts';
import type { Unit } from '../../units/unit.ts';
import type { LineSyntax, NetworkTree } from '../ast.ts';
import { valuesOf } from './line-values.ts';

const TIME = dimensionNames.indexOf('time');
const LENGTH = dimensionNames.indexOf('length');
const MASS = dimensionNames.indexOf('mass');
const AMOUNTS = (['mol', 'individuals', 'molecules', 'cells'] as const).map((name) =>
  dimensionNames.indexOf(name),
);

/** A unit with what is asked of it again and again. */
export interface ReadyUnit {
  readonly unit: Unit;
  readonly dimension: Dimension;
  readonly printed: string;
}

/** A unit in terms of the result units: multiply a value in it by `factor` to have it in `to`. */
export interface Conversion {
  readonly factor: Rational;
  readonly to: ReadyUnit;
}

/** The units of all results of a text: the first time unit, the first amount unit and the first volume unit in it. */
export class ResultUnits {
  readonly time: Unit | null;
  readonly amount: Unit | null;
  readonly volume: Unit | null;
  private readonly conversions = new Map<string, Conversion>();
  private readonly rateUnits = new Map<string, ReadyUnit | null>();
  private readonly byDimension = new Map<string, ReadyUnit>();
  /** What was asked last again and again, by the object itself: a text has few units, and each is one object. */
  private readonly conversionOf = new WeakMap<Unit, Conversion>();
  private readonly unitOfDimension = new WeakMap<Dimension, ReadyUnit>();
  private readonly ofWholeOrder = new Map<number, ReadyUnit | null>();

  constructor(tree: NetworkTree) {
    let time: Unit | null = null;
    let amount: Unit | null = null;
    let volume: Unit | null = null;
    for (const line of tree.lines) {
      if (time && amount && line.kind !== 'volume') continue;
      for (const { value, keys } of placesOf(line)) {
        walkSyntax(value, (part) => {
          if (part.kind !== 'measured') return;
          time ??= timeIn(part.unit);
          if (line.kind === 'volume') volume ??= part.unit;
          else amount ??= amountIn(part.unit, keys);
        });
      }
    }
    this.time = time;
    this.amount = amount;
    this.volume = volume;
  }

  printed(): NetworkUnits {
    const print = (unit: Unit | null) => unit && printUnit(unit);
    return { time: print(this.time), amount: print(this.amount), volume: print(this.volume) };
  }

  /** The unit of the rate constant of a reaction of this order: amount^(1 - order) / time; null where it has none. */
  rateUnit(order: Rational): ReadyUnit | null {
    const key = rational.print(order);
    const known = this.rateUnits.get(key);
    if (known !== undefined) return known;
    const unit = this.makeRateUnit(rational.subtract(rational.one, order));
    const ready = unit && readyUnit(unit);
    this.rateUnits.set(key, ready);
    return ready;
  }

  /** As rateUnit, for an order that is a whole number. */
  rateUnitOfOrder(order: number): ReadyUnit | null {
    let unit = this.ofWholeOrder.get(order);
    if (unit === undefined) {
      unit = this.rateUnit(rational.ofInteger(order));
      this.ofWholeOrder.set(order, unit);
    }
    return unit;
  }

  /** How a value in a unit is turned into the units of the results. */
  convert(unit: Unit): Conversion {
    let conversion = this.conversionOf.get(unit);
    if (conversion === undefined) {
      conversion = this.findConversion(unit);
      this.conversionOf.set(unit, conversion);
    }
    return conversion;
  }

  private findConversion(unit: Unit): Conversion {
    const key = printUnit(unit);
    const known = this.conversions.get(key);
    if (known) return known;
    const to = this.unitFor(dimensionOf(unit));
    const conversion = { factor: rational.divide(scaleOf(unit), scaleOf(to.unit)), to };
    this.conversions.set(key, conversion);
    return conversion;
  }

  private makeRateUnit(exponent: Rational): Unit | null {
    const time = unitPower(this.time ?? [{ symbol: 's', power: 1 }], -1);
    if (exponent.numerator === 0n) return time;
    if (!this.amount || !rational.isInteger(exponent)) return null;
    return unitProduct(unitPower(this.amount, Number(exponent.numerator)), time);
  }

  /** The unit of a dimension made of the result units, and of L, m and the like for what they leave. */
  unitFor(dimension: Dimension): ReadyUnit {
    let unit = this.unitOfDimension.get(dimension);
    if (unit === undefined) {
      unit = this.findUnit(dimension);
      this.unitOfDimension.set(dimension, unit);
    }
    return unit;
  }

  private findUnit(dimension: Dimension): ReadyUnit {
    const key = dimension.join();
    const known = this.byDimension.get(key);
    if (known) return known;
    const ready = readyUnit(this.makeUnit(dimension));
    this.byDimension.set(key, ready);
    return ready;
  }

  private makeUnit(dimension: Dimension): Unit {
    const left = [...dimension];
    let target: Unit = [];
    const divideBy = (part: Unit | null, dimension: number) => {
      const powers = part ? dimensionOf(part) : [];
      const power = (left[dimension] ?? 0) / (powers[dimension] ?? NaN);
      if (!part || power === 0 || !Number.isInteger(power)) return;
      target = unitProduct(target, unitPower(part, power));
      powers.forEach((value, i) => (left[i] = (left[i] ?? 0) - value * power));
    };
    if (this.amount) divideBy(this.amount, keyDimension(this.amount));
    divideBy(this.time, TIME);
    if ((left[LENGTH] ?? 0) % 3 === 0) divideBy(this.volume ?? [{ symbol: 'L', power: 1 }], LENGTH);
    const rest = ['s', 'm', 'g', 'mol', 'individuals', 'molecules', 'cells'];
    rest.forEach((symbol, i) => divideBy([{ symbol, power: 1 }], i));
    return target;
  }
}

function readyUnit(unit: Unit): ReadyUnit {
  return { unit, dimension: dimensionOf(unit), printed: printUnit(unit) };
}

function timeIn(unit: Unit): Unit | null {
  const factor = unit.find(({ symbol }) => dimensionOf([{ symbol, power: 1 }])[TIME] === 1);
  return factor ? [{ symbol: factor.symbol, power: 1 }] : null;
}

/** The dimension by whose power an amount unit is recognised: mol and counts before mass, mass before length. */
function keyDimension(unit: Unit): number {
  const powers = dimensionOf(unit);
  return [...AMOUNTS, MASS, LENGTH].find((i) => powers[i] !== 0) ?? LENGTH;
}

/** The values of a line, each with the dimensions that tell an amount there. */
function placesOf(line: LineSyntax): { value: ExpressionSyntax; keys: readonly number[] }[] {
  if (line.kind === 'row') {
    return line.items.flatMap(({ kind, value }) =>
      value ? [{ value, keys: kind === 'law' || kind === 'net' ? inLaws : anywhere }] : [],
    );
  }
  const keys =
    line.kind === 'let' ? AMOUNTS : line.kind === 'start' || line.kind === 'fix' ? anywhere : inLaws;
  return valuesOf(line).map((value) => ({ value, keys }));
}

/**
 * What tells an amount: where one must stand (rate constants, starts, fixed values) also a bare volume, "/L" being a number
 * per volume; in laws, rates and events, where "L/s" is a flow, only a mass besides; in a `let` neither.
 */
const inLaws = [...AMOUNTS, MASS];
const anywhere = [...inLaws, LENGTH];

/**
 * The amount unit that a unit holds: what is left without time, to the power that makes it an amount. From "/uM/s" that is
 * uM, from "mL/cells/d" cells/mL. Null where its key is none of `keys`.
 */
function amountIn(unit: Unit, keys: readonly number[]): Unit | null {
  const rest = unit.filter(({ symbol }) => dimensionOf([{ symbol, power: 1 }])[TIME] === 0);
  const powers = dimensionOf(rest);
  const key = keyDimension(rest);
  if (!keys.includes(key)) return null;
  const power = key === LENGTH ? -(powers[key] ?? 0) / 3 : (powers[key] ?? 0);
  const factors = rest.map((factor) => ({ symbol: factor.symbol, power: factor.power / power }));
  const sound = rest.length > 0 && factors.every((factor) => Number.isInteger(factor.power));
  return sound ? unitOf(factors) : null;
}
