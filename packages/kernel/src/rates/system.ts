import { type OdeSystem, timeSlot, type SparsePattern, type SystemFunction } from '../ode/problem.ts';
import {
  gradient,
  type Graph,
  makeTapes,
  type Node,
  nodesAbove,
  type Output,
  readsSlot,
  spaces,
} from '../program/index.ts';
import { type Change, type RateEquations, slopesOf, type Term } from './equations.ts';
import type { NamedNodes } from './named-nodes.ts';
import { along, noSensitivities, type SensitivityPlan } from './sensitivities.ts';

/** About how many operations one routine holds; longer ones are slow to compile. */
const tapeLimit = 3000;

/** Systems of fewer terms are built at once. */
const manyTerms = 1000;

/** How a system is built from equations. */
export interface SystemOptions {
  readonly functions?: readonly NamedNodes[];
  readonly sensitivities?: SensitivityPlan;
  /** Called between stages; may throw to end the work. */
  readonly checkpoint?: (() => void) | undefined;
}

/**
 * The rate equations as routines for the solver, with forward sensitivities appended: variable n(1 + k) + i is ∂x_i/∂p_k,
 * whose equation is ds/dt = J s + ∂f/∂p (Dickinson, Gelinas 1976). Its Jacobian is exact, second derivatives included.
 */
export function odeSystem(equations: RateEquations, options: SystemOptions = {}): OdeSystem {
  const { functions = [], sensitivities = noSensitivities } = options;
  const { graph } = equations;
  const dimension = equations.variables.length * (1 + sensitivities.directions.length);
  const terms = [...equations.terms, ...sensitivityTerms(equations, sensitivities)];
  const checkpoint = terms.length < manyTerms ? () => undefined : (options.checkpoint ?? (() => undefined));
  checkpoint();
  const { pattern, entries } = jacobian(graph, terms, dimension);
  checkpoint();
  const rightHandSide = tapes(
    graph,
    sums(graph, terms, dimension, ({ rate }) => rate),
  );
  checkpoint();
  return {
    dimension,
    parameters: equations.parameterValues.length + sensitivities.parameters,
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

/** The right-hand side of every variable, as nodes. */
export function flow({ graph, terms, variables }: RateEquations): Node[] {
  return sums(graph, terms, variables.length, ({ rate }) => rate);
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

/** Entries are summed over terms in their order, row by row. */
function jacobian(
  graph: Graph,
  terms: readonly Term[],
  size: number,
): { pattern: SparsePattern; entries: Node[] } {
  const byRow = termsByRow(terms, size);
  const rowStart = new Int32Array(size + 1);
  const columns: number[] = [];
  const entries: Node[] = [];
  const zero = graph.constant(0);
  /** The sum so far of each column of the present row; -1 where it has none. */
  const sumOf = new Int32Array(size).fill(-1);
  for (let row = 0; row < size; row++) {
    const touched: number[] = [];
    for (let n = byRow.start[row]!; n < byRow.start[row + 1]!; n++) {
      const factor = byRow.factors[n]!;
      for (const { variable: column, node } of terms[byRow.terms[n]!]!.slopes) {
        if (sumOf[column]! < 0) {
          touched.push(column);
          sumOf[column] = zero;
        }
        sumOf[column] = accumulate(graph, sumOf[column]!, node, factor);
      }
    }
    touched.sort((a, b) => a - b);
    for (const column of touched) {
      const node = sumOf[column]!;
      sumOf[column] = -1;
      if (graph.isConstant(node, 0)) continue;
      columns.push(column);
      entries.push(node);
    }
    rowStart[row + 1] = columns.length;
  }
  return { pattern: { size, rowStart, columns: Int32Array.from(columns) }, entries };
}

/** Which terms change each variable and by which factor, terms ascending. */
function termsByRow(
  terms: readonly Term[],
  size: number,
): { start: Int32Array; terms: Int32Array; factors: Float64Array } {
  const start = new Int32Array(size + 1);
  for (const { changes } of terms) for (const { variable } of changes) start[variable + 1]!++;
  for (let row = 0; row < size; row++) start[row + 1]! += start[row]!;
  const next = start.slice();
  const list = new Int32Array(start[size]!);
  const factors = new Float64Array(start[size]!);
  terms.forEach(({ changes }, index) => {
    for (const { variable, factor } of changes) {
      const place = next[variable]!++;
      list[place] = index;
      factors[place] = factor;
    }
  });
  return { start, terms: list, factors };
}

function timeDerivative(
  equations: RateEquations,
  terms: readonly Term[],
  dimension: number,
): ReturnType<typeof makeTapes> | null {
  const { graph, time } = equations;
  const none = graph.constant(0);
  const timed = nodesAbove(graph, time);
  if (!terms.some(({ rate }) => timed[rate] === 1)) return null;
  const slope = (rate: Node): Node =>
    timed[rate] === 1 ? (gradient(graph, rate, (node) => node === time).get(time) ?? none) : none;
  const slopes = new Map(terms.map((term) => [term, slope(term.rate)]));
  if ([...slopes.values()].every((node) => node === none)) return null;
  return tapes(
    graph,
    sums(graph, terms, dimension, (term) => slopes.get(term)!),
  );
}

function sensitivityTerms(equations: RateEquations, plan: SensitivityPlan): Term[] {
  const { graph } = equations;
  const count = equations.variables.length;
  return plan.directions.flatMap((direction, k) => {
    const offset = count * (1 + k);
    const shifted = (list: readonly Change[]): Change[] =>
      list.map(({ variable, factor }) => ({ variable: variable + offset, factor }));
    return equations.terms.map<Term>(({ rate, changes, slopes }) => {
      const by = along(equations, rate, direction, offset, slopes);
      return { rate: by, changes: shifted(changes), slopes: slopesOf(graph, by) };
    });
  });
}
