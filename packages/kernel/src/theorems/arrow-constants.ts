import type { Network, Quantity, Rational } from '@stillroom/shared/network';
import { add, equals, isZero, multiply, ONE, power, sign, ZERO } from '../exact/index.ts';
import type { StructuralNetwork } from '../network/index.ts';
import { compartmentOfSpecies, crossesCompartments } from '../rates/compartments.ts';

/** The mass-action constant of every arrow: equal rows added, the powers of fixed species multiplied in. */
export interface ArrowConstants {
  /** Positive exact values by arrow; null unless every arrow has one. */
  readonly exact: readonly Rational[] | null;
  /** What each written reaction adds to the constant of its arrow, under the name of the constant it was written with. */
  readonly parts: readonly {
    readonly name: string;
    readonly arrow: number;
    readonly value: Rational | null;
  }[];
  /** Readable, by arrow: "k1", "(k1 + k3)", "k1*A^2" with A fixed. */
  readonly names: readonly string[];
  /** Whether some arrow has the constant 0. */
  readonly zero: boolean;
  /** Why `exact` is null, as the end of a sentence ("k3 has no value"); null where it is not. */
  readonly why: string | null;
}

/** What stands for the constants of a network that is too large to read them one by one. */
export const unreadConstants: ArrowConstants = {
  exact: null,
  parts: [],
  names: [],
  zero: false,
  why: 'the network is too large to read all constants',
};

/** Reads the constants of a structural network. Laws that are mass action in disguise count as mass action. */
export function arrowConstants(structure: StructuralNetwork): ArrowConstants {
  const values: (Rational | null)[] = Array.from({ length: structure.arrows.count }, () => ZERO);
  const labels: string[][] = values.map(() => []);
  const parts: { name: string; arrow: number; value: Rational | null }[] = [];
  let why: string | null = null;
  const { source } = structure;
  const places = source.compartments.length > 1 ? compartmentOfSpecies(source) : null;
  for (let reaction = 0; reaction < structure.reactions.count; reaction++) {
    const arrow = structure.reactions.arrow[reaction]!;
    const { name, label, value, problem } = constantOf(
      structure,
      structure.reactions.source[reaction]!,
      places,
    );
    labels[arrow]!.push(label);
    parts.push({ name, arrow, value });
    why ??= problem;
    const sum = values[arrow]!;
    values[arrow] = sum === null || value === null ? null : add(sum, value);
  }
  const names = labels.map((list) => (list.length === 1 ? list[0]! : `(${list.join(' + ')})`));
  const zero = values.findIndex((value) => value !== null && isZero(value));
  if (why === null && zero >= 0) why = `${names[zero]} is 0`;
  const exact: Rational[] = [];
  for (const value of values) if (value !== null && sign(value) > 0) exact.push(value);
  return { exact: exact.length === values.length ? exact : null, parts, names, zero: zero >= 0, why };
}

interface NamedConstant {
  readonly name: string;
  /** With the powers of fixed species. */
  readonly label: string;
  readonly value: Rational | null;
  readonly problem: string | null;
}

function constantOf(
  { source }: StructuralNetwork,
  reaction: number,
  places: Int32Array | null,
): NamedConstant {
  const law = source.reactions.law[reaction]!;
  const index = law < 0 ? source.reactions.constant[reaction]! : (source.laws[law]?.massAction ?? -1);
  const constant = source.constants[index];
  if (constant === undefined) {
    const line = source.rows[source.reactions.row[reaction]!]?.line;
    const words = `law of line ${line}`;
    return {
      name: words,
      label: words,
      value: null,
      problem: `line ${line} has a law that is not mass action`,
    };
  }
  const { name } = constant;
  if (places !== null && crossesCompartments(places, speciesOf(source, reaction))) {
    // Its constant goes with concentrations of one volume and changes those of another.
    const line = source.rows[source.reactions.row[reaction]!]?.line;
    const problem = `line ${line} leads from one compartment to another, where a law gives an amount per time`;
    return { name, label: name, value: null, problem };
  }
  let label = name;
  let { value, problem } = valueOf(constant.quantity, name);
  const { complexes } = source;
  const complex = source.reactions.from[reaction]!;
  for (let k = complexes.offsets[complex]!; k < complexes.offsets[complex + 1]!; k++) {
    const species = complexes.species[k]!;
    const held = source.fixed.get(species);
    if (held === undefined) continue;
    const exponent = complexes.numerators[k]! / (complexes.denominators?.[k] ?? 1);
    const heldName = source.species[species]!;
    label += exponent === 1 ? `*${heldName}` : `*${heldName}^${exponent}`;
    const factor = valueOf(held, heldName);
    problem ??= factor.problem;
    value = value === null || factor.value === null ? null : raise(value, factor.value, exponent);
    if (value === null) problem ??= `${heldName} enters with a power that is not a whole number`;
  }
  return { name, label, value, problem };
}

function speciesOf({ complexes, reactions }: Network, reaction: number): number[] {
  return [reactions.from[reaction]!, reactions.to[reaction]!].flatMap((complex) =>
    Array.from(complexes.species.subarray(complexes.offsets[complex], complexes.offsets[complex + 1])),
  );
}

function raise(value: Rational, base: Rational, exponent: number): Rational | null {
  if (Number.isInteger(exponent)) return multiply(value, power(base, exponent));
  return equals(base, ONE) ? value : null;
}

function valueOf(
  quantity: Quantity | null,
  name: string,
): { value: Rational | null; problem: string | null } {
  if (quantity === null) return { value: null, problem: `${name} has no value` };
  return quantity.exact === null
    ? { value: null, problem: `${name} is not a rational number` }
    : { value: quantity.exact, problem: null };
}
