import {
  evaluate,
  exactValue,
  type Expression,
  freeNames,
  printExpression,
} from '@stillroom/shared/expression';
import { type Network, rational, type Rational } from '@stillroom/shared/network';
import { Derivations } from './derivations.ts';
import { RateError } from './error.ts';

/** Values that replace those of the text, by name. */
export interface Overrides {
  readonly constants?: Readonly<Record<string, number>> | undefined;
  readonly start?: Readonly<Record<string, number>> | undefined;
}

/** The numbers with which a network is run: constants (null where there is none) and species at the start. */
export interface Values {
  readonly constants: readonly (number | null)[];
  readonly start: Float64Array;
  /** Which constants follow others; one with a trial value of its own does not. */
  readonly derivations: Derivations;
  /** How starts and fixed values of species follow constants; one with a trial value of its own does not. */
  readonly startFrom: ReadonlyMap<number, Expression>;
}

/**
 * The network's own values with the overrides put in; constants derived from overridden ones follow. A fixed species starts at, and stays at, its fixed value unless
 * `start` names it. Throws RateError for a name that the network does not have or a value that cannot be used.
 */
export function resolveValues(network: Network, overrides: Overrides): Values {
  const constants = network.constants.map(({ quantity }) => quantity?.value ?? null);
  const start = new Float64Array(network.species.length);
  for (const [species, { value }] of network.start) start[species] = value;
  for (const [species, { value }] of network.fixed) start[species] = value;
  const given = new Set<number>();
  const constantNames = network.constants.map(({ name }) => name);
  put('constants', 'constant', overrides.constants ?? {}, constantNames, (index, value) => {
    constants[index] = value;
    given.add(index);
  });
  const derivations = new Derivations(network.constants, given);
  const compute = follow(network, derivations, given, constants);
  const startFrom = new Map<number, Expression>();
  for (const [species, { expression }] of [...network.start, ...network.fixed]) {
    if (expression !== undefined) startFrom.set(species, expression);
  }
  put('start', 'species', overrides.start ?? {}, network.species, (index, value) => {
    start[index] = value;
    startFrom.delete(index);
  });
  if (given.size > 0) {
    for (const [species, expression] of startFrom)
      start[species] = startValue(network.species[species]!, expression, compute);
  }
  return { constants, start, derivations, startFrom };
}

/** The value of a species at the start that follows constants. */
function startValue(name: string, expression: Expression, compute: Compute): number {
  const { number } = compute(expression) ?? { number: NaN };
  if (number >= 0 && Number.isFinite(number)) return number;
  const what = Number.isFinite(number) ? 'negative' : 'not a finite number';
  throw new RateError(
    `With these constants the value of ${name}, ${printExpression(expression)}, is ${what}.`,
  );
}

/** The value of an expression with the present constants, null where one of them has none. */
type Compute = (
  expression: Expression,
) => { readonly exact: Rational | null; readonly number: number } | null;

/**
 * Computes anew, exactly where that can be and rounded once, what is derived from the `given` constants; returns how
 * anything else that follows constants is computed.
 */
function follow(
  network: Network,
  derivations: Derivations,
  given: ReadonlySet<number>,
  constants: (number | null)[],
): Compute {
  const places = new Map(network.constants.map(({ name }, index) => [name, index]));
  const exact = new Map<number, Rational | null>();
  for (const index of given) exact.set(index, rational.ofDecimal(String(constants[index])));
  const exactOf = (name: string): Rational | null => {
    const index = places.get(name) ?? -1;
    const known = exact.get(index);
    return known === undefined ? (network.constants[index]?.quantity?.exact ?? null) : known;
  };
  const compute: Compute = (expression) => {
    const missing = freeNames(expression).some(
      (name) => (constants[places.get(name) ?? -1] ?? null) === null,
    );
    if (missing) return null;
    const value = exactValue(expression, exactOf);
    const number =
      value === null
        ? evaluate(expression, (name) => constants[places.get(name)!]!)
        : rational.toNumber(value);
    return { exact: value, number };
  };
  for (const index of derivations.followers(given)) {
    const expression = derivations.expression(index)!;
    const value = compute(expression);
    exact.set(index, value?.exact ?? null);
    constants[index] = value?.number ?? null;
    if (value === null || Number.isFinite(value.number)) continue;
    throw new RateError(
      `With these constants ${network.constants[index]!.name} = ${printExpression(expression)} is not a finite number.`,
    );
  }
  return compute;
}

function put(
  field: string,
  kind: string,
  given: Readonly<Record<string, number>>,
  names: readonly string[],
  set: (index: number, value: number) => void,
): void {
  const places = new Map(names.map((name, index) => [name, index]));
  const unknown = Object.keys(given).filter((name) => !places.has(name));
  if (unknown.length > 0) {
    throw new RateError(
      `"${field}" gives a value to ${list(unknown)}, but the network has no ${kind} of that name.`,
      names.length === 0 ? `The network has no ${kind}.` : `It has ${list(names)}.`,
    );
  }
  for (const [name, value] of Object.entries(given)) {
    if (!Number.isFinite(value))
      throw new RateError(`"${field}" gives ${name} a value that is not a finite number.`);
    set(places.get(name)!, value);
  }
}

/** "a, b and c", cut after twelve names. */
export function list(names: readonly string[]): string {
  const shown = names.slice(0, 12);
  const more = names.length - shown.length;
  if (more > 0) return `${shown.join(', ')} and ${more} more`;
  return shown.length < 2 ? shown.join('') : `${shown.slice(0, -1).join(', ')} and ${shown.at(-1)}`;
}
