import {
  parameterSlot,
  timeSlot,
  type OdeSystem,
  type SparsePattern,
  type SystemFunction,
} from '../ode/problem.ts';
import {
  gradient,
  type Graph,
  makeTapes,
  type Node,
  type Output,
  readsSlot,
  spaces,
} from '../program/index.ts';
import { type Change, type RateEquations, slopesOf, type Term } from './equations.ts';

/** About how many operations one routine holds; longer ones are slow to compile. */
const tapeLimit = 3000;

/** A further function of state and time: one node for each number. */
export interface NamedNodes {
  readonly name: string;
  readonly nodes: readonly Node[];
}

/**
 * The rate equations as routines for the solver, with forward sensitivities by the parameters `sensitiveTo` appended:
 * variable n(1 + k) + i is ∂x_i/∂p_k, whose equation is ds/dt = J s + ∂f/∂p (Dickinson, Gelinas 1976). Its Jacobian is
 * exact, second derivatives included.
 */
export function odeSystem(
  equations: RateEquations,
  functions: readonly NamedNodes[] = [],
  sensitiveTo: readonly number[] = [],
): OdeSystem {
  const { graph } = equations;
  const dimension = equations.variables.length * (1 + sensitiveTo.length);
  const terms = [...equations.terms, ...sensitivityTerms(equations, sensitiveTo)];
  const { pattern, entries } = jacobian(graph, terms, dimension);
  const rightHandSide = tapes(
    graph,
    sums(graph, terms, dimension, ({ rate }) => rate),
  );
  return {
    dimension,
    parameters: equations.parameterValues.length,
    rightHandSide,
    jacobian: tapes(graph, entries),
    pattern,
    timeDependent: rightHandSide.some((tape) => readsSlot(tape, timeSlot)),
    timeDerivative: timeDerivative(equations, terms, dimension),
    functions: functions.map<SystemFunction>(({ name, nodes }) => ({
      name,
      length: nodes.length,
      tapes: tapes(graph, nodes),
    })),
  };
}

function tapes(graph: Graph, nodes: readonly Node[]): ReturnType<typeof makeTapes> {
  const outputs = nodes.map<Output>((node, slot) => ({ node, slot, space: spaces.second }));
  return makeTapes(graph, outputs, tapeLimit);
}

/** Σ over terms of `rateOf(term)` times the change of each variable. */
function sums(graph: Graph, terms: readonly Term[], dimension: number, rateOf: (term: Term) => Node): Node[] {
  const total = new Array<Node>(dimension).fill(graph.constant(0));
  for (const term of terms) {
    const rate = rateOf(term);
    for (const { variable, factor } of term.changes)
      total[variable] = accumulate(graph, total[variable]!, rate, factor);
  }
  return total;
}

/** sum + factor · rate, with the operation that a factor of ±1 allows. */
function accumulate(graph: Graph, sum: Node, rate: Node, factor: number): Node {
  if (factor < 0) return graph.subtract(sum, graph.multiply(graph.constant(-factor), rate));
  return graph.add(sum, graph.multiply(graph.constant(factor), rate));
}

function jacobian(
  graph: Graph,
  terms: readonly Term[],
  size: number,
): { pattern: SparsePattern; entries: Node[] } {
  const rows = Array.from({ length: size }, () => new Map<number, Node>());
  for (const { changes, slopes } of terms) {
    for (const { variable: row, factor } of changes) {
      for (const { variable: column, node } of slopes) {
        const sum = rows[row]!.get(column) ?? graph.constant(0);
        rows[row]!.set(column, accumulate(graph, sum, node, factor));
      }
    }
  }
  const rowStart = new Int32Array(size + 1);
  const columns: number[] = [];
  const entries: Node[] = [];
  rows.forEach((row, index) => {
    for (const [column, node] of [...row].sort((a, b) => a[0] - b[0])) {
      if (graph.isConstant(node, 0)) continue;
      columns.push(column);
      entries.push(node);
    }
    rowStart[index + 1] = columns.length;
  });
  return { pattern: { size, rowStart, columns: Int32Array.from(columns) }, entries };
}

function timeDerivative(
  equations: RateEquations,
  terms: readonly Term[],
  dimension: number,
): ReturnType<typeof makeTapes> | null {
  const { graph, time } = equations;
  const none = graph.constant(0);
  const slope = new Map(
    terms.map((term) => [term, gradient(graph, term.rate, (node) => node === time).get(time) ?? none]),
  );
  if ([...slope.values()].every((node) => node === none)) return null;
  return tapes(
    graph,
    sums(graph, terms, dimension, (term) => slope.get(term)!),
  );
}

function sensitivityTerms(equations: RateEquations, sensitiveTo: readonly number[]): Term[] {
  const { graph } = equations;
  const count = equations.variables.length;
  return sensitiveTo.flatMap((parameter, k) => {
    const offset = count * (1 + k);
    const parameterNode = graph.load(parameterSlot(parameter));
    const shifted = (list: readonly Change[]): Change[] =>
      list.map(({ variable, factor }) => ({ variable: variable + offset, factor }));
    return equations.terms.map<Term>(({ rate, changes, slopes }) => {
      let along =
        gradient(graph, rate, (node) => node === parameterNode).get(parameterNode) ?? graph.constant(0);
      for (const { variable, node } of slopes) {
        along = graph.add(along, graph.multiply(node, graph.load(variable + offset, spaces.first)));
      }
      return { rate: along, changes: shifted(changes), slopes: slopesOf(graph, along) };
    });
  });
}
