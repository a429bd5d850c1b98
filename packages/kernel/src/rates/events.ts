import type { Expression } from '@stillroom/shared/expression';
import type { Network, NetworkEvent } from '@stillroom/shared/network';
import type { OdeEvent } from '../ode/index.ts';
import { leafSlopesFunction, leavesFunction } from '../ode/index.ts';
import { gradient, type Node } from '../program/index.ts';
import type { Derivations } from './derivations.ts';
import { type RateEquations, slopesOf } from './equations.ts';
import { RateError } from './error.ts';
import { expressionNode } from './expression.ts';
import type { NamedNodes } from './named-nodes.ts';
import type { Target } from './names.ts';
import { along, type Direction, noSensitivities, type SensitivityPlan } from './sensitivities.ts';
import { flow } from './system.ts';

/** Events as the solver wants them, and the functions that they need of the system. */
export interface CompiledEvents {
  readonly events: readonly OdeEvent[];
  readonly functions: readonly NamedNodes[];
}

type Truth = (signs: Int8Array) => boolean;

/** Constants that events set, by index: those they name, and with them those that follow. */
export function constantsSetByEvents(
  network: Network,
  derivations: Derivations,
): { readonly named: ReadonlySet<number>; readonly all: ReadonlySet<number> } {
  const names = new Set(network.events.flatMap(({ set }) => set.map(({ name }) => name)));
  const named = new Set(network.constants.flatMap(({ name }, index) => (names.has(name) ? [index] : [])));
  return { named, all: new Set([...named, ...derivations.without(named).followers(named)]) };
}

/** Parameters that events set: constants and fixed species. */
export function parametersSetByEvents(network: Network, equations: RateEquations): Set<number> {
  const places = new Set(constantsSetByEvents(network, equations.derivations).all);
  for (const { set } of network.events) {
    for (const { name } of set) {
      const target = equations.target(name);
      if (target?.kind === 'parameter') places.add(target.index);
    }
  }
  return places;
}

/**
 * Splits the condition of each event into leaves (differences of the two sides of its comparisons) and their logic,
 * so that the moment at which it turns true can be found as a root. Constants derived from one that an event sets follow,
 * unless some event sets them too. With sensitivities the functions by which those go through events come along.
 */
export function compileEvents(
  network: Network,
  equations: RateEquations,
  sensitivities: SensitivityPlan = noSensitivities,
): CompiledEvents {
  const { events } = network;
  if (events.length === 0) return { events: [], functions: [] };
  const leaves: Node[] = [];
  const functions: NamedNodes[] = [];
  const derivations = equations.derivations.without(
    constantsSetByEvents(network, equations.derivations).named,
  );
  const differentiated = sensitivities.directions.length > 0;
  const compiled = events.map<OdeEvent>((event, index) => {
    const firstLeaf = leaves.length;
    const own: Node[] = [];
    const holds = truth(equations, event.when, own);
    leaves.push(...own);
    const changes = changesOf(network, equations, derivations, event);
    const values = `event ${index}`;
    const valueSlopes = differentiated ? `event ${index} slopes` : null;
    functions.push({ name: values, nodes: changes.map(({ value }) => value) });
    if (valueSlopes !== null) {
      functions.push({
        name: valueSlopes,
        nodes: sensitivities.directions.flatMap((direction, k) =>
          changes.map(({ value }) => alongEvent(equations, value, direction, k)),
        ),
      });
    }
    const targets = changes.map(({ target }) => target);
    return { firstLeaf, leafCount: own.length, holds, values, valueSlopes, targets };
  });
  functions.push({ name: leavesFunction, nodes: leaves });
  if (differentiated) functions.push(leafSlopes(equations, sensitivities, leaves));
  equations.requireValues();
  return { events: compiled, functions };
}

/** What an event sets, and to which nodes. */
function changesOf(
  network: Network,
  equations: RateEquations,
  derivations: Derivations,
  { set }: NetworkEvent,
): { target: Target; value: Node }[] {
  const given = new Map<string, Node>();
  const changes = set.map(({ name, value }) => {
    const target = equations.target(name);
    if (target === null) {
      throw new RateError(
        `An event sets "${name}", which is neither a species nor a constant of the network.`,
      );
    }
    const node = equations.expression(value);
    given.set(name, node);
    return { target, value: node };
  });
  const constants = changes.flatMap(({ target: { kind, index } }) =>
    kind === 'parameter' && index < network.constants.length ? [index] : [],
  );
  for (const index of derivations.followers(constants)) {
    const value = expressionNode(
      equations.graph,
      derivations.expression(index)!,
      (name) => given.get(name) ?? equations.resolve(name),
    );
    given.set(network.constants[index]!.name, value);
    changes.push({ target: { kind: 'parameter', index }, value });
  }
  return changes;
}

/** How a new value moves with a constant while the event's time shifts too: its own dependence on the time counts. */
function alongEvent(equations: RateEquations, value: Node, direction: Direction, k: number): Node {
  const { graph, parameterNode } = equations;
  const moved = along(equations, value, direction, equations.variables.length * (1 + k));
  const shift = parameterNode(direction.timeShift);
  return graph.add(moved, graph.multiply(timeSlope(equations, value), shift));
}

/** For each leaf: its rate of change along the course, then its derivative by each constant at a fixed time. */
function leafSlopes(equations: RateEquations, plan: SensitivityPlan, leaves: readonly Node[]): NamedNodes {
  const { graph } = equations;
  const rates = flow(equations);
  const nodes = leaves.flatMap((leaf) => {
    let course = timeSlope(equations, leaf);
    for (const { variable, node } of slopesOf(graph, leaf)) {
      course = graph.add(course, graph.multiply(node, rates[variable]!));
    }
    const by = plan.directions.map((direction, k) =>
      along(equations, leaf, direction, equations.variables.length * (1 + k)),
    );
    return [course, ...by];
  });
  return { name: leafSlopesFunction, nodes };
}

/** The partial derivative by the time. */
function timeSlope({ graph, time }: RateEquations, node: Node): Node {
  return gradient(graph, node, (one) => one === time).get(time) ?? graph.constant(0);
}

/** Whether the condition holds, from the signs of the leaves that it appends. */
function truth(equations: RateEquations, condition: Expression, leaves: Node[]): Truth {
  const { graph, resolve } = equations;
  switch (condition.kind) {
    case 'not': {
      const of = truth(equations, condition.of, leaves);
      return (signs) => !of(signs);
    }
    case 'logic': {
      const left = truth(equations, condition.left, leaves);
      const right = truth(equations, condition.right, leaves);
      return condition.operator === 'and'
        ? (signs) => left(signs) && right(signs)
        : (signs) => left(signs) || right(signs);
    }
    case 'compare': {
      const left = expressionNode(graph, condition.left, resolve);
      const right = expressionNode(graph, condition.right, resolve);
      const leaf = leaves.push(graph.subtract(left, right)) - 1;
      const test = signTests[condition.operator];
      return (signs) => test(signs[leaf]!);
    }
    default: {
      const leaf = leaves.push(expressionNode(graph, condition, resolve)) - 1;
      return (signs) => signs[leaf] !== 0;
    }
  }
}

const signTests: Readonly<Record<'==' | '!=' | '<' | '<=' | '>' | '>=', (sign: number) => boolean>> = {
  '==': (sign) => sign === 0,
  '!=': (sign) => sign !== 0,
  '<': (sign) => sign < 0,
  '<=': (sign) => sign <= 0,
  '>': (sign) => sign > 0,
  '>=': (sign) => sign >= 0,
};
