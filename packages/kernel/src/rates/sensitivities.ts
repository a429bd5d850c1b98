import { parameterSlot } from '../ode/problem.ts';
import { gradient, type Node, spaces } from '../program/index.ts';
import { type RateEquations, type Slope, slopesOf } from './equations.ts';
import type { NamedNodes } from './named-nodes.ts';

/** How everything that a constant moves moves with it. */
export interface Direction {
  /** The parameter by which is differentiated. */
  readonly by: number;
  /** Parameters that move with it, itself among them, and how fast (∂q/∂p). */
  readonly moved: readonly { readonly parameter: number; readonly rate: Node }[];
  /** Where those rates stand as parameters, by the parameter that moves; empty where they never change. */
  readonly rateOf: ReadonlyMap<number, number>;
  /** Where the shift of the present event's time by the constant stands as a parameter; -1 without events. */
  readonly timeShift: number;
}

/** How a course is differentiated by some of its constants. */
export interface SensitivityPlan {
  readonly directions: readonly Direction[];
  /** Parameters that it needs besides those of the equations, which they follow. */
  readonly parameters: number;
  /** The start values of those parameters, in order, then those of `startPlaces`. */
  readonly starts: readonly Node[];
  /** Places of the state whose start is not 0: derivatives of starts that follow constants. */
  readonly startPlaces: readonly number[];
}

export const noSensitivities: SensitivityPlan = {
  directions: [],
  parameters: 0,
  starts: [],
  startPlaces: [],
};

/** The name under which a system offers the start values of a plan's parameters. */
export const startsFunction = 'sensitivity starts';

/**
 * Plans the derivatives by the parameters `by`. Derived constants move with those that they follow, and parameters that
 * events set (`settable`) may come to move with any. `hasEvents`: event times move too.
 */
export function planSensitivities(
  equations: RateEquations,
  by: readonly number[],
  settable: ReadonlySet<number>,
  hasEvents: boolean,
): SensitivityPlan {
  const { graph } = equations;
  const starts: Node[] = [];
  const first = equations.parameterValues.length;
  const directions = by.map<Direction>((parameter) => {
    const atStart = startRates(equations, parameter);
    const all = new Set([...atStart.keys(), ...settable]);
    const rateOf = new Map<number, number>();
    if (all.size > 1 || settable.size > 0) {
      for (const one of all) rateOf.set(one, first + starts.push(atStart.get(one) ?? graph.constant(0)) - 1);
    }
    const moved = [...all].map((one) => {
      const place = rateOf.get(one);
      const rate = place === undefined ? atStart.get(one)! : equations.parameterNode(place);
      return { parameter: one, rate };
    });
    const timeShift = hasEvents ? first + starts.push(graph.constant(0)) - 1 : -1;
    return { by: parameter, moved, rateOf, timeShift };
  });
  const parameters = starts.length;
  const startPlaces = by.flatMap((parameter, k) =>
    [...startSlopes(equations, parameter)].map(([variable, slope]) => {
      starts.push(slope);
      return equations.variables.length * (1 + k) + variable;
    }),
  );
  return { directions, parameters, starts, startPlaces };
}

/** ∂x/∂p at the start for every variable whose start follows the constant. */
function startSlopes(equations: RateEquations, parameter: number): Map<number, Node> {
  const rates = startRates(equations, parameter);
  const slopes = new Map<number, Node>();
  for (const [species, expression] of equations.startFrom) {
    const variable = equations.variableOf[species]!;
    const slope = variable < 0 ? null : rateAlong(equations, equations.expression(expression), rates);
    if (slope !== null) slopes.set(variable, slope);
  }
  return slopes;
}

/** The derivative of a node by what moves, null where it reads none of it. */
function rateAlong(equations: RateEquations, node: Node, rates: ReadonlyMap<number, Node>): Node | null {
  const { graph } = equations;
  let rate: Node | null = null;
  for (const [source, slope] of parameterSlopes(equations, node, new Set(rates.keys())))
    rate = graph.add(rate ?? graph.constant(0), graph.multiply(slope, rates.get(source)!));
  return rate;
}

/** ∂q/∂p at the start for every constant, and every species held constant, q that moves with p. */
function startRates(equations: RateEquations, parameter: number): Map<number, Node> {
  const { graph, derivations } = equations;
  const rates = new Map<number, Node>([[parameter, graph.constant(1)]]);
  for (const follower of derivations.followers([parameter])) {
    const node = equations.expression(derivations.expression(follower)!);
    rates.set(follower, rateAlong(equations, node, rates) ?? graph.constant(0));
  }
  for (const [species, expression] of equations.startFrom) {
    if (equations.variableOf[species]! >= 0) continue;
    const rate = rateAlong(equations, equations.expression(expression), rates);
    if (rate !== null) rates.set(equations.fixedParameter(species), rate);
  }
  return rates;
}

/** The derivatives of a node by those of some parameters that it reads. */
function parameterSlopes(
  { graph }: RateEquations,
  node: Node,
  parameters: ReadonlySet<number>,
): Map<number, Node> {
  const firstSlot = parameterSlot(0);
  const parameterOf = (one: Node): number => graph.slot(one, spaces.fixed) - firstSlot;
  const slopes = gradient(graph, node, (one) => parameters.has(parameterOf(one)));
  return new Map([...slopes].map(([one, slope]) => [parameterOf(one), slope]));
}

/**
 * The derivative of a node in a direction, Σ ∂/∂q · ∂q/∂p + Σ ∂/∂x_i · s_i, where s_i stands at place `offset` + i of the
 * state. `slopes` are the derivatives by the state, where they are known.
 */
export function along(
  equations: RateEquations,
  node: Node,
  { moved }: Direction,
  offset: number,
  slopes: readonly Slope[] = slopesOf(equations.graph, node),
): Node {
  const { graph } = equations;
  const bySlope = parameterSlopes(equations, node, new Set(moved.map(({ parameter }) => parameter)));
  let sum = graph.constant(0);
  for (const { parameter, rate } of moved) {
    const slope = bySlope.get(parameter);
    if (slope !== undefined) sum = graph.add(sum, graph.multiply(slope, rate));
  }
  for (const { variable, node: slope } of slopes) {
    sum = graph.add(sum, graph.multiply(slope, graph.load(variable + offset, spaces.first)));
  }
  return sum;
}

/** The plan's own function of the system. */
export function startsOf({ starts }: SensitivityPlan): NamedNodes[] {
  return starts.length === 0 ? [] : [{ name: startsFunction, nodes: starts }];
}
