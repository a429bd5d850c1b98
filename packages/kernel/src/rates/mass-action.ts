import type { ComplexTable } from '@stillroom/shared/network';
import { type Graph, hostNumber, type Node } from '../program/index.ts';
import { integerPower } from './expression.ts';

/** A species of a complex and how many of it the complex has. */
export interface Member {
  readonly species: number;
  readonly coefficient: number;
}

/** The members of complex number `complex`. */
export function members(complexes: ComplexTable, complex: number): Member[] {
  const list: Member[] = [];
  for (let j = complexes.offsets[complex]!; j < complexes.offsets[complex + 1]!; j++) {
    const coefficient = complexes.numerators[j]! / (complexes.denominators?.[j] ?? 1);
    list.push({ species: complexes.species[j]!, coefficient });
  }
  return list;
}

/**
 * How much of each species a reaction makes (negative: uses), by ascending species; 0 where it only takes part. Members
 * of both sides ascend.
 */
export function netCoefficients(from: readonly Member[], to: readonly Member[]): Member[] {
  const net: Member[] = [];
  let j = 0;
  for (const { species, coefficient } of from) {
    for (; j < to.length && to[j]!.species < species; j++) net.push(to[j]!);
    const made = to[j]?.species === species ? to[j++]!.coefficient : 0;
    net.push({ species, coefficient: made - coefficient });
  }
  for (; j < to.length; j++) net.push(to[j]!);
  return net;
}

/** constant · ∏ x^coefficient, where `at` gives the node of a species. */
export function massActionRate(
  graph: Graph,
  constant: Node,
  reactants: readonly Member[],
  at: (species: number) => Node,
): Node {
  let product = constant;
  for (const { species, coefficient } of reactants) {
    product = graph.multiply(product, speciesPower(graph, at(species), coefficient));
  }
  return product;
}

/** x^n; for n that is not whole a negative x (round-off around 0) counts as 0. */
function speciesPower(graph: Graph, x: Node, n: number): Node {
  if (n === 1) return x;
  if (Number.isInteger(n)) return integerPower(graph, x, n);
  const zero = graph.constant(0);
  return graph.select(graph.less(zero, x), graph.call(hostNumber('pow'), x, graph.constant(n)), zero);
}

/** The derivative of a mass-action rate by one of its reactants. */
export function massActionSlope(
  graph: Graph,
  constant: Node,
  reactants: readonly Member[],
  by: number,
  at: (species: number) => Node,
): Node {
  let order = 0;
  for (const { species, coefficient } of reactants) if (species === by) order = coefficient;
  let product = graph.multiply(graph.constant(order), constant);
  for (const { species, coefficient } of reactants) {
    const exponent = species === by ? coefficient - 1 : coefficient;
    product = graph.multiply(product, speciesPower(graph, at(species), exponent));
  }
  return product;
}
