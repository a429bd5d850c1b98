import type { Expression } from '@stillroom/shared/expression';
import { exactValue } from '@stillroom/shared/expression';
import type { Rational } from '../../exact/index.ts';
import { add, isZero, multiply, negate, ONE, rational, sign, ZERO } from '../../exact/index.ts';
import type { Evidence, Finding } from './evidence.ts';
import { Unconfirmed } from './evidence.ts';

/**
 * Laws that are not mass action, read again as quotients of polynomials in species and constants, all constants being
 * positive unknowns. Positive exactly when all reactants are present: no coefficient of the numerator is negative, every
 * term has all reactants, one has nothing else that moves, and the denominator is positive where nothing is present.
 */
export function positiveWithReactants(evidence: Evidence): Finding {
  return everyLaw(evidence, (law) => vanishesRightly(law));
}

/** Besides, it depends on its reactants only and no derivative has a negative coefficient in its numerator. */
export function growsWithReactants(evidence: Evidence): Finding {
  return everyLaw(evidence, (law) => vanishesRightly(law) && derivatives(law).every(({ falls }) => !falls));
}

/** Besides, no derivative after a reactant vanishes. */
export function risesWithReactants(evidence: Evidence): Finding {
  return everyLaw(
    evidence,
    (law) => vanishesRightly(law) && derivatives(law).every(({ falls, rises }) => !falls && rises),
  );
}

interface Law {
  readonly fraction: Fraction;
  readonly reactants: readonly string[];
  /** Names that move: species that are not held constant. */
  readonly moving: ReadonlySet<string>;
}

function everyLaw({ network, plain, holds }: Evidence, confirms: (law: Law) => boolean): Finding {
  const untouched = network.events.length === 0 && network.rateRules.size === 0;
  if (holds !== untouched) return 'an event or an equation of its own changes a species.';
  if (!holds) return null;
  const moving = new Set(plain.species);
  const outputs = new Set(network.outputs.map(({ name }) => name));
  for (const { from, source, massAction } of plain.reactions) {
    if (massAction) continue;
    const written = network.laws[network.reactions.law[source]!]!;
    const fraction = written.net ? null : fractionOf(written.expression);
    const names = fraction === null ? [] : namesOf(fraction);
    if (fraction === null || names.some((name) => name === 't' || outputs.has(name)))
      return new Unconfirmed('a law is not a quotient of polynomials.');
    const law = { fraction, reactants: [...plain.complexes[from]!.keys()], moving };
    if (!confirms(law)) return new Unconfirmed('the coefficients of a law do not show it.');
  }
  return null;
}

function vanishesRightly({ fraction: { above, below }, reactants, moving }: Law): boolean {
  const positive = (p: Polynomial): boolean =>
    p.size > 0 && [...p.values()].every((value) => sign(value) > 0);
  const present = (term: string): string[] => variablesOf(term).filter((name) => moving.has(name));
  return (
    positive(above) &&
    positive(below) &&
    [...above.keys()].every((term) => reactants.every((name) => present(term).includes(name))) &&
    [...above.keys()].some((term) => present(term).every((name) => reactants.includes(name))) &&
    [...below.keys()].some((term) => present(term).length === 0)
  );
}

/** For each name that moves: the sign of the numerator P'Q − PQ'; anything but a reactant counts as falling. */
function derivatives({
  fraction: { above, below },
  reactants,
  moving,
}: Law): { falls: boolean; rises: boolean }[] {
  const names = new Set([...reactants, ...namesOf({ above, below }).filter((name) => moving.has(name))]);
  return [...names].map((name) => {
    const numerator = minus(times(derivative(above, name), below), times(above, derivative(below, name)));
    const values = [...numerator.values()];
    return {
      falls: !reactants.includes(name) || values.some((value) => sign(value) < 0),
      rises: values.length > 0,
    };
  });
}

/** The degree of numerator minus that of the denominator in one name; null where the expression is no such quotient. */
export function growthDegree(expression: Expression, name: string): number | null {
  const fraction = fractionOf(expression);
  const highest = (p: Polynomial): number =>
    Math.max(...[...p.keys()].map((term) => powersOf(term).get(name) ?? 0));
  return fraction && highest(fraction.above) - highest(fraction.below);
}

/** Coefficients by term; a term is "A^2 K^1", names ascending; zeros are absent. */
type Polynomial = ReadonlyMap<string, Rational>;

interface Fraction {
  readonly above: Polynomial;
  readonly below: Polynomial;
}

const MOST_TERMS = 400;

function fractionOf(expression: Expression): Fraction | null {
  const value = exactValue(expression, () => null);
  if (value !== null) return { above: constant(value), below: constant(ONE) };
  switch (expression.kind) {
    case 'name':
      return { above: new Map([[`${expression.name}^1`, ONE]]), below: constant(ONE) };
    case 'negate': {
      const of = fractionOf(expression.of);
      return of && { ...of, above: minus(new Map(), of.above) };
    }
    case 'binary':
      return binary(expression);
    case 'call': {
      const [x, half, power] = expression.arguments;
      if (expression.name !== 'hill' || power?.kind !== 'number' || x === undefined || half === undefined)
        return null;
      const raised = powerOf(fractionOf(x), power.value);
      const other = powerOf(fractionOf(half), power.value);
      return raised && other && over(raised, plus(other, raised));
    }
    default:
      return null;
  }
}

function binary(expression: Extract<Expression, { kind: 'binary' }>): Fraction | null {
  const left = fractionOf(expression.left);
  if (expression.operator === '^') {
    const power = exactValue(expression.right, () => null);
    return power === null || power.denominator !== 1n ? null : powerOf(left, Number(power.numerator));
  }
  const right = fractionOf(expression.right);
  if (left === null || right === null) return null;
  switch (expression.operator) {
    case '+':
      return plus(left, right);
    case '-':
      return plus(left, { ...right, above: minus(new Map(), right.above) });
    case '*':
      return small({ above: times(left.above, right.above), below: times(left.below, right.below) });
    case '/':
      return over(left, right);
    default:
      return null;
  }
}

function plus(a: Fraction, b: Fraction): Fraction | null {
  const same = keyOf(a.below) === keyOf(b.below);
  return small(
    same
      ? { above: sum(a.above, b.above, ONE), below: a.below }
      : {
          above: sum(times(a.above, b.below), times(b.above, a.below), ONE),
          below: times(a.below, b.below),
        },
  );
}

function over(a: Fraction, b: Fraction | null): Fraction | null {
  if (b === null || b.above.size === 0) return null;
  return small({ above: times(a.above, b.below), below: times(a.below, b.above) });
}

function powerOf(base: Fraction | null, power: number): Fraction | null {
  if (base === null || !Number.isInteger(power) || power < 0 || power > 20) return null;
  let result: Fraction | null = { above: constant(ONE), below: constant(ONE) };
  for (let k = 0; k < power && result !== null; k++)
    result = small({ above: times(result.above, base.above), below: times(result.below, base.below) });
  return result;
}

function small(fraction: Fraction): Fraction | null {
  return fraction.above.size + fraction.below.size <= MOST_TERMS ? fraction : null;
}

function constant(value: Rational): Polynomial {
  return isZero(value) ? new Map() : new Map([['', value]]);
}

function sum(a: Polynomial, b: Polynomial, factor: Rational): Polynomial {
  const result = new Map(a);
  for (const [term, value] of b) {
    const total = add(result.get(term) ?? ZERO, multiply(factor, value));
    if (isZero(total)) result.delete(term);
    else result.set(term, total);
  }
  return result;
}

function minus(a: Polynomial, b: Polynomial): Polynomial {
  return sum(a, b, negate(ONE));
}

function times(a: Polynomial, b: Polynomial): Polynomial {
  let result: Polynomial = new Map();
  for (const [term, value] of a) {
    const row = new Map(
      [...b].map(([other, factor]) => [joined(term, other), multiply(value, factor)] as const),
    );
    result = sum(result, row, ONE);
  }
  return result;
}

function powersOf(term: string): Map<string, number> {
  return new Map(
    term
      .split(' ')
      .filter((part) => part !== '')
      .map((part): [string, number] => {
        const at = part.lastIndexOf('^');
        return [part.slice(0, at), Number(part.slice(at + 1))];
      }),
  );
}

function termOf(powers: ReadonlyMap<string, number>): string {
  return [...powers]
    .filter(([, power]) => power > 0)
    .sort(([a], [b]) => (a < b ? -1 : 1))
    .map(([name, power]) => `${name}^${power}`)
    .join(' ');
}

function joined(a: string, b: string): string {
  const powers = powersOf(a);
  for (const [name, power] of powersOf(b)) powers.set(name, (powers.get(name) ?? 0) + power);
  return termOf(powers);
}

function derivative(p: Polynomial, name: string): Polynomial {
  let result: Polynomial = new Map();
  for (const [term, value] of p) {
    const powers = powersOf(term);
    const power = powers.get(name) ?? 0;
    if (power === 0) continue;
    powers.set(name, power - 1);
    result = sum(result, new Map([[termOf(powers), multiply(value, rational(BigInt(power)))]]), ONE);
  }
  return result;
}

function variablesOf(term: string): string[] {
  return [...powersOf(term).keys()];
}

function namesOf({ above, below }: Fraction): string[] {
  return [...new Set([...above.keys(), ...below.keys()].flatMap(variablesOf))];
}

function keyOf(p: Polynomial): string {
  return [...p]
    .map(([term, { numerator, denominator }]) => `${term}:${numerator}/${denominator}`)
    .sort()
    .join();
}
