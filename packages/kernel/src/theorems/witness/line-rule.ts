import type { Rational } from '../../exact/index.ts';
import {
  add,
  compare,
  divide,
  equals,
  isZero,
  multiply,
  negate,
  power,
  rational,
  sign,
  subtract,
  toDouble,
  ZERO,
} from '../../exact/index.ts';
import { moleculesPerUnit } from '../counts/count-scale.ts';
import type { Evidence, Finding } from './evidence.ts';
import type { Amounts, PlainNetwork } from './plain-network.ts';
import { arrowRates, changeOf } from './plain-network.ts';
import { exactOf } from './reading.ts';

/** The counts do not explode, by the classification of chains on a line worked out again. */
export function doesNotExplode(evidence: Evidence): Finding {
  return agrees(evidence, ({ order, alpha, beta }) => {
    const a = sign(alpha);
    return !((order > 1 && a > 0) || (order > 2 && a === 0 && sign(beta) > 0));
  });
}

/** Positive recurrent, by the same classification. */
export function recurs(evidence: Evidence): Finding {
  return agrees(evidence, ({ order, alpha, beta }) => {
    const a = sign(alpha);
    const b = sign(beta);
    return a < 0 || (a === 0 && ((b < 0 && order > 1) || (b === 0 && order > 2)));
  });
}

interface Leading {
  readonly order: number;
  readonly alpha: Rational;
  readonly beta: Rational;
}

function agrees(evidence: Evidence, classify: (leading: Leading) => boolean): Finding {
  const { plain, verdict, holds, witness } = evidence;
  const line = lineOf(plain);
  if (line === null) return 'the counts do not move along one line without end.';
  if (verdict.scope === 'all constants') {
    const orders = line.map(({ order }) => order);
    const highest = Math.max(...orders);
    const ways = new Set(line.filter(({ order }) => order === highest).map(({ steps }) => sign(steps)));
    if (ways.size !== 1 || line.some(({ standing }) => standing)) return 'the sign depends on the constants.';
    const [way] = ways;
    const leading = { order: highest, alpha: rational(BigInt(way!)), beta: ZERO };
    return classify(leading) === holds ? null : 'the leading terms say the opposite.';
  }
  const leading = leadingOf(evidence, line);
  if (leading === null) return 'a value is missing.';
  const decisive = isZero(leading.alpha) ? leading.beta : leading.alpha;
  if (witness?.kind !== 'number' || !equals(exactOf(witness.left), decisive)) return 'the number is another.';
  return classify(leading) === holds ? null : 'the leading terms say the opposite.';
}

interface Step {
  readonly key: string;
  readonly from: number;
  readonly steps: Rational;
  readonly order: number;
  readonly standing: boolean;
}

/** The primitive direction of all changes, which no species leaves downwards, and every arrow along it. */
function directionOf(plain: PlainNetwork): Amounts | null {
  const changes = plain.reactions.map((reaction) => changeOf(plain, reaction));
  const [first] = changes;
  if (first === undefined) return null;
  const values = [...first.values()].map(({ numerator }) => numerator);
  const common = values.reduce((a, b) => {
    let x = a < 0n ? -a : a;
    let y = b < 0n ? -b : b;
    while (y !== 0n) [x, y] = [y, x % y];
    return x;
  }, 0n);
  const sense = values[0]! > 0n ? common : -common;
  const direction = new Map([...first].map(([name, amount]) => [name, divide(amount, rational(sense))]));
  return [...direction.values()].every((value) => sign(value) > 0) ? direction : null;
}

function lineOf(plain: PlainNetwork): Step[] | null {
  const direction = directionOf(plain);
  if (direction === null) return null;
  const [lead] = direction.keys();
  const steps = new Map<string, Step>();
  for (const reaction of plain.reactions) {
    const change = changeOf(plain, reaction);
    const along = divide(change.get(lead!) ?? ZERO, direction.get(lead!)!);
    const fits = plain.species.every((name) =>
      equals(change.get(name) ?? ZERO, multiply(along, direction.get(name) ?? ZERO)),
    );
    if (!fits) return null;
    const reactants = [...plain.complexes[reaction.from]!];
    steps.set(`${reaction.from} ${reaction.to}`, {
      key: `${reaction.from} ${reaction.to}`,
      from: reaction.from,
      steps: along,
      order: reactants.reduce((sum, [name, amount]) => sum + (direction.has(name) ? toDouble(amount) : 0), 0),
      standing: reactants.some(([name]) => !direction.has(name)),
    });
  }
  return [...steps.values()];
}

/** R, α and β from values of the rates at whole numbers: differences of order R and R − 1 of the mean change. */
function leadingOf({ network, plain }: Evidence, line: readonly Step[]): Leading | null {
  const rates = arrowRates(plain);
  const direction = directionOf(plain)!;
  const [scale] = plain.species.map((name) => moleculesPerUnit(network, network.species.indexOf(name)));
  if (rates === null || scale === null || scale === undefined) return null;
  const start = (name: string): Rational =>
    multiply(network.start.get(network.species.indexOf(name))?.exact ?? ZERO, scale);
  const useStart = line.some(({ standing }) => standing) || direction.size > 1;
  const constant = ({ key, from }: Step): Rational => {
    const molecules = [...plain.complexes[from]!.values()].reduce((sum, amount) => sum + toDouble(amount), 0);
    return divide(rates.get(key)!, power(scale, molecules));
  };
  const rateAt = (step: Step, t: number): Rational => {
    let value = constant(step);
    for (const [name, amount] of plain.complexes[step.from]!) {
      const base = useStart ? start(name) : ZERO;
      const count = add(base, multiply(direction.get(name) ?? ZERO, rational(BigInt(t))));
      if (!direction.has(name) && compare(count, amount) < 0) return ZERO;
      for (let k = 0; k < toDouble(amount); k++)
        value = multiply(value, subtract(count, rational(BigInt(k))));
    }
    return value;
  };
  const active = line.filter((step) => !isZero(rateAt(step, 1_000_003)));
  const order = Math.max(...active.map((step) => step.order));
  const coefficients = (weight: (steps: Rational) => Rational): [Rational, Rational] => {
    const values = Array.from({ length: order + 1 }, (_, t) =>
      active.reduce((sum, step) => add(sum, multiply(weight(step.steps), rateAt(step, t))), ZERO),
    );
    return lastTwo(values);
  };
  const [alpha, gamma] = coefficients((steps) => steps);
  const [square] = coefficients((steps) => multiply(steps, steps));
  return { order, alpha, beta: subtract(gamma, divide(square, rational(2n))) };
}

/** The two highest coefficients of the polynomial of degree values.length − 1 through values at 0, 1, 2, …: Newton's form. */
function lastTwo(values: readonly Rational[]): [Rational, Rational] {
  const order = values.length - 1;
  let row = [...values];
  const divided: Rational[] = [row[0]!];
  for (let k = 1; k <= order; k++) {
    row = row.slice(1).map((value, i) => divide(subtract(value, row[i]!), rational(BigInt(k))));
    divided.push(row[0]!);
  }
  const top = divided[order] ?? ZERO;
  if (order === 0) return [top, ZERO];
  // t (t − 1) … (t − R + 1) has −R(R − 1)/2 below its leading term.
  const below = rational(BigInt((order * (order - 1)) / 2));
  return [top, add(divided[order - 1]!, negate(multiply(top, below)))];
}
