import type { Expression } from '@stillroom/shared/expression';
import type { Network } from '@stillroom/shared/network';
import { parameterSlot, timeSlot } from '../ode/problem.ts';
import { gradient, Graph, type Node, spaces } from '../program/index.ts';
import { compartmentOfSpecies, compartmentVolumes, crossesCompartments } from './compartments.ts';
import type { Derivations } from './derivations.ts';
import { RateError } from './error.ts';
import { expressionNode } from './expression.ts';
import { massActionRate, massActionSlope, type Member, members, netCoefficients } from './mass-action.ts';
import { NameTable, type Target } from './names.ts';
import type { Values } from './values.ts';

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
  /** Which constants follow others. */
  readonly derivations: Derivations;
  /** How starts and fixed values of species follow constants. */
  readonly startFrom: ReadonlyMap<number, Expression>;
  /** The volume of each compartment. */
  readonly volumes: readonly number[];
  /** Reactions left out because their constant is 0. */
  readonly dropped: readonly number[];
  /** The node of a species, constant, output or "t"; null for another name. */
  resolve(name: string): Node | null;
  /** The node of an expression over its names. */
  expression(expression: Expression): Node;
  /** Where a named number stands that an event may set: a species or a constant. */
  target(name: string): Target | null;
  /** The parameter that holds a species which is held constant. */
  fixedParameter(species: number): number;
  /** The node of a parameter. */
  parameterNode(parameter: number): Node;
  /** Throws a RateError that names every constant used so far that has no value. */
  requireValues(): void;
}

/** How rate equations are built. */
export interface EquationOptions {
  /** Constants whose arrows stay even where they are 0, because they are changed or differentiated by. */
  readonly kept?: ReadonlySet<number>;
  /** Called often; may throw to end the work. */
  readonly checkpoint?: (() => void) | undefined;
}

/** Reactions between two calls of the checkpoint. */
const checkpointEvery = 512;

/**
 * Builds the rate equations with the given values. Arrows whose constant is 0 are left out. Throws RateError for what
 * the network leaves open.
 */
export function rateEquations(
  network: Network,
  values: Values,
  options: EquationOptions = {},
): RateEquations {
  const graph = new Graph();
  const names = new NameTable(graph, network, values);
  const dropped: number[] = [];
  const equations: RateEquations = {
    graph,
    variables: names.variables,
    variableOf: names.variableOf,
    terms: [],
    time: graph.load(timeSlot),
    parameterValues: names.parameterValues,
    derivations: values.derivations,
    startFrom: values.startFrom,
    volumes: compartmentVolumes(network, values.constants),
    dropped,
    resolve: (name) => names.resolve(name),
    expression: (expression) => expressionNode(graph, expression, (name) => names.resolve(name)),
    target: (name) => names.target(name),
    fixedParameter: (species) => names.parameterOfFixed(species),
    parameterNode: (parameter) => graph.load(parameterSlot(parameter)),
    requireValues: () => names.requireValues(),
  };
  const terms = reactionTerms(network, values, equations, names, options, dropped);
  terms.push(...ruleTerms(network, equations));
  names.requireValues();
  return { ...equations, terms };
}

function reactionTerms(
  network: Network,
  values: Values,
  equations: RateEquations,
  names: NameTable,
  { kept, checkpoint }: EquationOptions,
  dropped: number[],
): Term[] {
  const { graph, variableOf } = equations;
  const { reactions, complexes, laws } = network;
  const compartmentOf = compartmentOfSpecies(network);
  const lawNodes = laws.map<Node | null>(() => null);
  const complexMembers = Array.from({ length: complexes.count }, (_, index) => members(complexes, index));
  const at = (species: number): Node => names.species(species);
  const terms: Term[] = [];
  for (let r = 0; r < reactions.count; r++) {
    if (r % checkpointEvery === checkpointEvery - 1) checkpoint?.();
    const from = complexMembers[reactions.from[r]!]!;
    const to = complexMembers[reactions.to[r]!]!;
    const law = reactions.law[r]!;
    const scale =
      equations.volumes.length < 2
        ? null
        : amountScale(network, equations.volumes, compartmentOf, from, to, law, r);
    const constant = law < 0 ? reactions.constant[r]! : (laws[law]!.massAction ?? -1);
    if (constant >= 0 && values.constants[constant] === 0 && kept?.has(constant) !== true) {
      dropped.push(r);
      continue;
    }
    const changes = netChanges(from, to, variableOf, scale);
    if (changes.length === 0) continue;
    if (law >= 0) {
      const rate = (lawNodes[law] ??= expressionNode(graph, laws[law]!.expression, equations.resolve));
      if (!graph.isConstant(rate, 0)) terms.push(lawTerm(equations, rate, changes));
      continue;
    }
    const factor = names.constant(constant);
    const slopes: Slope[] = [];
    for (const { species } of from) {
      const variable = variableOf[species]!;
      if (variable >= 0) slopes.push({ variable, node: massActionSlope(graph, factor, from, species, at) });
    }
    terms.push({ rate: massActionRate(graph, factor, from, at), changes, slopes });
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
  scale: ((species: number) => number) | null,
): Change[] {
  const changes: Change[] = [];
  for (const { species, coefficient } of netCoefficients(from, to)) {
    const variable = variableOf[species]!;
    if (coefficient === 0 || variable < 0) continue;
    changes.push({ variable, factor: scale === null ? coefficient : coefficient / scale(species) });
  }
  return changes;
}

/**
 * What an amount per time is divided by to change the concentration of a species: the volume of its compartment for a
 * law across compartments; null where that is 1 (such laws are concentrations per time).
 */
function amountScale(
  network: Network,
  volumes: readonly number[],
  compartmentOf: Int32Array,
  from: readonly Member[],
  to: readonly Member[],
  law: number,
  reaction: number,
): ((species: number) => number) | null {
  const touched = [...from, ...to].map(({ species }) => species);
  if (!crossesCompartments(compartmentOf, touched)) return null;
  if (law < 0) {
    const line = network.rows[network.reactions.row[reaction]!]?.line;
    throw new RateError(
      `The reaction on line ${line ?? '?'} goes across compartments by mass action.`,
      'Give it a `law` in amount per time.',
    );
  }
  return (species) => volumes[compartmentOf[species]!]!;
}
