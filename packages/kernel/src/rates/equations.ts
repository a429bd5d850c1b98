import type { Network } from '@stillroom/shared/network';
import { parameterSlot, timeSlot } from '../ode/problem.ts';
import { gradient, Graph, type Node, spaces } from '../program/index.ts';
import { compartmentOfSpecies, crossesCompartments } from './compartments.ts';
import { RateError } from './error.ts';
import { expressionNode } from './expression.ts';
import { massActionRate, massActionSlope, type Member, members, netCoefficients } from './mass-action.ts';
import { list, type Values } from './values.ts';

/** How fast one term moves one variable: its rate times `factor`. */
export interface Change {
  readonly variable: number;
  readonly factor: number;
}

/** The derivative of a rate by one variable. */
export interface Slope {
  readonly variable: number;
  readonly node: Node;
}

/** One reaction (or rate rule) as the rate equations see it. */
export interface Term {
  readonly rate: Node;
  readonly changes: readonly Change[];
  /** Derivatives by the variables on which the rate depends. */
  readonly slopes: readonly Slope[];
}

/**
 * The rate equations dx/dt = Σ rate · (net change) of a network, over its variables: the species that are not held
 * constant. Parameters are the constants in their order, then the fixed species.
 */
export interface RateEquations {
  readonly graph: Graph;
  /** Species index of each variable, ascending. */
  readonly variables: readonly number[];
  /** Variable of each species, -1 where it is held constant. */
  readonly variableOf: Int32Array;
  readonly terms: readonly Term[];
  readonly time: Node;
  readonly parameterValues: Float64Array;
  /** The node of a species, constant, output or "t"; null for another name. */
  resolve(name: string): Node | null;
  /** Where a named number stands that an event may set: a species or a constant. */
  target(name: string): { readonly kind: 'variable' | 'parameter'; readonly index: number } | null;
  /** The node of a variable. */
  variableNode(variable: number): Node;
  /** Throws a RateError that names every constant used so far that has no value. */
  requireValues(): void;
}

/** Builds the rate equations with the given values. Throws RateError for what the network leaves open. */
export function rateEquations(network: Network, values: Values): RateEquations {
  const graph = new Graph();
  const names = new NameTable(graph, network, values);
  const equations: RateEquations = {
    graph,
    variables: names.variables,
    variableOf: names.variableOf,
    terms: [],
    time: graph.load(timeSlot),
    parameterValues: names.parameterValues,
    resolve: (name) => names.resolve(name),
    target: (name) => names.target(name),
    variableNode: (variable) => graph.load(variable, spaces.first),
    requireValues: () => names.requireValues(),
  };
  const terms = [...reactionTerms(network, equations, names), ...ruleTerms(network, equations)];
  names.requireValues();
  return { ...equations, terms };
}

function reactionTerms(network: Network, equations: RateEquations, names: NameTable): Term[] {
  const { graph } = equations;
  const { reactions, complexes, laws } = network;
  const compartmentOf = compartmentOfSpecies(network);
  const lawNodes = laws.map<Node | null>(() => null);
  const complexMembers = Array.from({ length: complexes.count }, (_, index) => members(complexes, index));
  const at = (species: number): Node => names.species(species);
  const terms: Term[] = [];
  for (let r = 0; r < reactions.count; r++) {
    const from = complexMembers[reactions.from[r]!]!;
    const to = complexMembers[reactions.to[r]!]!;
    const law = reactions.law[r]!;
    const scale = amountScale(network, compartmentOf, from, to, law, r);
    const changes = netChanges(from, to, equations.variableOf, scale);
    if (changes.length === 0) continue;
    if (law >= 0) {
      const rate = (lawNodes[law] ??= expressionNode(graph, laws[law]!.expression, equations.resolve));
      if (!graph.isConstant(rate, 0)) terms.push(lawTerm(equations, rate, changes));
    } else {
      const constant = names.constant(reactions.constant[r]!);
      const slopes = from
        .filter(({ species }) => equations.variableOf[species]! >= 0)
        .map(({ species }) => ({
          variable: equations.variableOf[species]!,
          node: massActionSlope(graph, constant, from, species, at),
        }));
      terms.push({ rate: massActionRate(graph, constant, from, at), changes, slopes });
    }
  }
  return terms;
}

function ruleTerms(network: Network, equations: RateEquations): Term[] {
  const terms: Term[] = [];
  for (const [species, expression] of network.rateRules) {
    const variable = equations.variableOf[species]!;
    if (variable < 0) {
      throw new RateError(
        `${network.species[species]} has a rate and is held constant by "fix".`,
        'Keep one of the two.',
      );
    }
    const rate = expressionNode(equations.graph, expression, equations.resolve);
    terms.push(lawTerm(equations, rate, [{ variable, factor: 1 }]));
  }
  return terms;
}

/** A term whose slopes come from differentiating its expression. */
function lawTerm({ graph }: RateEquations, rate: Node, changes: readonly Change[]): Term {
  return { rate, changes, slopes: slopesOf(graph, rate) };
}

/** The derivatives of a node by all places of the state that it reads, by ascending place. */
export function slopesOf(graph: Graph, rate: Node): Slope[] {
  const place = (node: Node): number => graph.slot(node, spaces.first);
  return [...gradient(graph, rate, (node) => place(node) >= 0)]
    .map(([node, slope]) => ({ variable: place(node), node: slope }))
    .sort((a, b) => a.variable - b.variable);
}

function netChanges(
  from: readonly Member[],
  to: readonly Member[],
  variableOf: Int32Array,
  scale: (species: number) => number,
): Change[] {
  return [...netCoefficients(from, to)]
    .filter(([species, change]) => change !== 0 && variableOf[species]! >= 0)
    .map(([species, change]) => ({ variable: variableOf[species]!, factor: change / scale(species) }))
    .sort((a, b) => a.variable - b.variable);
}

/**
 * What an amount per time is divided by to change the concentration of a species: the volume of its compartment for a
 * law across compartments, else 1 (such laws are concentrations per time).
 */
function amountScale(
  network: Network,
  compartmentOf: Int32Array,
  from: readonly Member[],
  to: readonly Member[],
  law: number,
  reaction: number,
): (species: number) => number {
  if (network.compartments.length < 2) return () => 1;
  const touched = [...from, ...to].map(({ species }) => species);
  if (!crossesCompartments(compartmentOf, touched)) return () => 1;
  if (law < 0) {
    const line = network.rows[network.reactions.row[reaction]!]?.line;
    throw new RateError(
      `The reaction on line ${line ?? '?'} goes across compartments by mass action.`,
      'Give it a `law` in amount per time.',
    );
  }
  return (species) => network.compartments[compartmentOf[species]!]!.volume.value;
}

/** Names of the network as nodes, and which constants without a value were asked for. */
class NameTable {
  readonly variables: number[] = [];
  readonly variableOf: Int32Array;
  readonly parameterValues: Float64Array;
  private readonly places = new Map<string, () => Node>();
  private readonly missing = new Set<number>();
  private readonly fixedParameter = new Map<number, number>();

  private readonly graph: Graph;
  private readonly network: Network;
  private readonly values: Values;

  constructor(graph: Graph, network: Network, values: Values) {
    this.graph = graph;
    this.network = network;
    this.values = values;
    this.variableOf = new Int32Array(network.species.length).fill(-1);
    const constants = network.constants.length;
    this.parameterValues = new Float64Array(constants + network.fixed.size);
    values.constants.forEach((value, index) => (this.parameterValues[index] = value ?? 0));
    network.species.forEach((name, species) => {
      if (network.fixed.has(species)) {
        const index = constants + this.fixedParameter.size;
        this.fixedParameter.set(species, index);
        this.parameterValues[index] = values.start[species]!;
      } else {
        this.variableOf[species] = this.variables.push(species) - 1;
      }
      this.places.set(name, () => this.species(species));
    });
    network.constants.forEach(({ name }, index) => this.places.set(name, () => this.constant(index)));
    for (const { name, expression } of network.outputs) {
      this.places.set(name, () => expressionNode(graph, expression, (inner) => this.resolve(inner)));
    }
    this.places.set('t', () => graph.load(timeSlot));
  }

  resolve(name: string): Node | null {
    return this.places.get(name)?.() ?? null;
  }

  target(name: string): { kind: 'variable' | 'parameter'; index: number } | null {
    const constant = this.network.constants.findIndex((entry) => entry.name === name);
    if (constant >= 0) return { kind: 'parameter', index: constant };
    const species = this.network.species.indexOf(name);
    if (species < 0) return null;
    const variable = this.variableOf[species]!;
    if (variable >= 0) return { kind: 'variable', index: variable };
    return { kind: 'parameter', index: this.fixedParameter.get(species)! };
  }

  species(species: number): Node {
    const parameter = this.fixedParameter.get(species);
    if (parameter !== undefined) return this.graph.load(parameterSlot(parameter));
    return this.graph.load(this.variableOf[species]!, spaces.first);
  }

  constant(index: number): Node {
    if (this.values.constants[index] === null) this.missing.add(index);
    return this.graph.load(parameterSlot(index));
  }

  requireValues(): void {
    if (this.missing.size === 0) return;
    const names = [...this.missing].sort((a, b) => a - b).map((index) => this.network.constants[index]!.name);
    throw new RateError(
      `${list(names)} ${names.length === 1 ? 'has' : 'have'} no value.`,
      `Write one in the network (${names[0]} = …) or under "constants" of this cell.`,
    );
  }
}
