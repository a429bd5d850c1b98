import { rational } from '../../network/index.ts';
import type { ExpressionSyntax } from '../../expression/syntax.ts';
import { printUnit, sameDimension } from '../../units/unit.ts';
import type { Unit } from '../../units/unit.ts';
import type { Rational } from '../../network/network.ts';
import type { SideSyntax } from '../ast.ts';
import type { Repair } from '../complaint.ts';
import { printReaction } from '../print.ts';
import type { ReadyUnit } from './result-units.ts';
import type { ConstantUse } from './rates.ts';
import { printExpression } from '../../expression/print.ts';
import type { Dimensions, ValueDimension } from './dimensions.ts';
import type { Elaboration } from './stage.ts';
import type { Scope } from './scope.ts';

/** A value that must be an amount: a start or a fixed value. */
export interface AmountUse {
  readonly species: string;
  readonly value: ExpressionSyntax;
  readonly scope: Scope;
}

/** A value with the unit that its place asks for. */
interface Demand {
  /** The rate constant or the amount whose value it is. */
  readonly of: ConstantUse | AmountUse;
  readonly value: ExpressionSyntax;
  readonly dimension: ValueDimension;
  /** Null where no unit of the text would do. */
  readonly wanted: ReadyUnit | null;
}

/** Whether the text is in units: any rate constant, start or fixed value has one. */
export function checkUnits(stage: Elaboration, dimensions: Dimensions, amounts: readonly AmountUse[]): void {
  const demands = [...rateDemands(stage, dimensions), ...amountDemands(stage, dimensions, amounts)];
  const inUnits = demands.some(({ dimension }) => dimension !== 'pure' && dimension !== null);
  if (!inUnits) return;
  for (const demand of demands) checkDemand(stage, demand);
}

/** The printed unit of each rate constant of a text in units, by constant. */
export function unitsOfRates(stage: Elaboration): Map<number, string> {
  const units = new Map<number, string>();
  if (!stage.units.time && !stage.units.amount) return units;
  for (const { constant, reactant } of stage.rows.uses) {
    const unit = units.has(constant) ? null : rateUnitFor(stage, reactant);
    if (unit) units.set(constant, unit.printed);
  }
  return units;
}

function rateDemands(stage: Elaboration, dimensions: Dimensions): Demand[] {
  const demands: Demand[] = [];
  for (const use of stage.rows.uses) {
    const { constant } = use;
    const name = stage.constants.nameOf(constant);
    const definition = stage.values.definition(name);
    if (!definition) continue;
    const wanted = rateUnitFor(stage, use.reactant);
    demands.push({ of: use, value: definition.value, dimension: dimensions.ofConstant(name), wanted });
  }
  return demands;
}

function amountDemands(stage: Elaboration, dimensions: Dimensions, amounts: readonly AmountUse[]): Demand[] {
  const wanted = stage.units.amount && stage.units.convert(stage.units.amount).to;
  return amounts.map((of) => ({ of, value: of.value, dimension: dimensions.of(of.value, of.scope), wanted }));
}

function rateUnitFor({ units }: Elaboration, reactant: SideSyntax): ReadyUnit | null {
  let order = 0;
  for (const { numerator, denominator } of reactant.terms) {
    if (denominator !== 1) return units.rateUnit(orderOf(reactant));
    order += numerator;
  }
  return units.rateUnitOfOrder(order);
}

/** The order of a reaction: the sum of the coefficients of its reactants. */
function orderOf(reactant: SideSyntax): Rational {
  let whole = 0;
  let sum = rational.zero;
  for (const { numerator, denominator } of reactant.terms) {
    if (denominator === 1) whole += numerator;
    else sum = rational.add(sum, rational.quotient(BigInt(numerator), BigInt(denominator)));
  }
  const order = rational.ofInteger(whole);
  return sum.numerator === 0n ? order : rational.add(sum, order);
}

function printUse({ reactant, product }: ConstantUse): string {
  return printReaction({
    family: null,
    sides: [reactant, product],
    arrows: [{ sign: '->', from: 0, to: 0 }],
  });
}

function checkDemand(stage: Elaboration, { of, value, dimension, wanted }: Demand): void {
  if (dimension === null) return;
  if (wanted && dimension !== 'pure' && sameDimension(dimension, wanted.dimension)) return;
  const isRate = 'constant' in of;
  const subject = isRate ? stage.constants.nameOf(of.constant) : `The value of ${of.species}`;
  const wantedText = wanted?.printed ?? null;
  const repairs = repairOf(value, wantedText);
  if (dimension === 'pure') {
    const example = wantedText ? `, such as ${wantedText}` : '';
    const message = `${subject} has no unit, but other values of this text have.`;
    stage.complaints.error(value, message, `Give it one${example}.`, repairs);
    return;
  }
  const unit = unitOfValue(value);
  const given = (unit ? printUnit(unit) : stage.units.unitFor(dimension).printed) || 'no unit';
  const reason = isRate
    ? `${printUse(of)} is of order ${rational.print(orderOf(of.reactant))}`
    : `amounts of this text are in ${wantedText ?? 'no unit'}`;
  const need = wantedText ? `needs ${wantedText}` : 'needs a unit that this text has no amount for';
  const hint = wantedText ? null : 'Give it a unit with an amount in it, such as /uM/s for order 2.';
  stage.complaints.error(value, `${subject} is in ${given}, but ${reason} and ${need}.`, hint, repairs);
}

function unitOfValue(value: ExpressionSyntax): Unit | null {
  return value.kind === 'measured' ? value.unit : null;
}

/** "Make it 2 /s": the number as it is with the unit that is asked for. */
function repairOf(value: ExpressionSyntax, wanted: string | null): Repair[] {
  if (wanted === null) return [];
  const number = value.kind === 'measured' ? value.of : value;
  const shown = number.kind === 'number' ? number.text : `(${printExpression(number)})`;
  const insert = `${shown} ${wanted}`;
  return [{ label: `Make it ${insert}`, from: value.from, to: value.to, insert }];
}
