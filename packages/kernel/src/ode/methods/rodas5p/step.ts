import type { Call, Routine } from '../../../program/index.ts';
import { pivotingSolver } from '../../linear/pivoting.ts';
import type { SymbolicFactorization } from '../../linear/symbolic.ts';
import { tableSolver } from '../../linear/table.ts';
import { unrolledFactor, unrolledSolve } from '../../linear/unrolled.ts';
import { timeSlot, type OdeSystem } from '../../problem.ts';
import { type CommonWorkspace, slots } from '../../workspace.ts';
import { setTime, VectorLoop } from '../loops.ts';
import { rodas5p } from './tableau.ts';
import type { RosenbrockWorkspace } from './workspace.ts';

/** Factorisations of more multiply-subtract operations than this are driven by tables. */
const unrolledWork = 4000;

/**
 * The routines of one step. "rodas5p.linearise" fills Jacobian and ∂f/∂t at the state; "rodas5p.attempt" factorises and
 * runs the stages with a fixed order of pivots, "rodas5p.attemptPivoting" with pivots chosen by size.
 */
export function rosenbrockRoutines(
  system: OdeSystem,
  common: CommonWorkspace,
  own: RosenbrockWorkspace,
  symbolic: SymbolicFactorization,
  memory: Float64Array,
): Map<string, Routine> {
  const routines = new Map<string, Routine>();
  for (const [name, routine] of linearAlgebra(system, own, symbolic, memory)) routines.set(name, routine);
  for (let stage = 0; stage < rodas5p.stages; stage++) {
    routines.set(`rodas5p.time${stage}`, setTime(timeSlot, slots.start, slots.step, rodas5p.times[stage]!));
    routines.set(`rodas5p.prepare${stage}`, prepareStage(system, common, own, stage));
  }
  routines.set('rodas5p.finish', finish(common, own));
  routines.set('rodas5p.jacobian', { kind: 'straight', tapes: system.jacobian });
  const linearise: Call[] = [
    { routine: 'rodas5p.time0' },
    { routine: 'rodas5p.jacobian', first: common.state, second: own.jacobian },
  ];
  if (system.timeDerivative !== null) {
    routines.set('rodas5p.timeDerivative', { kind: 'straight', tapes: system.timeDerivative });
    linearise.push({ routine: 'rodas5p.timeDerivative', first: common.state, second: own.timeDerivative });
  }
  routines.set('rodas5p.linearise', { kind: 'sequence', calls: linearise });
  for (const kind of ['', 'Pivoting']) {
    const calls: Call[] = [{ routine: `rodas5p.factor${kind}`, first: own.jacobian, second: own.factors }];
    for (let stage = 0; stage < rodas5p.stages; stage++) {
      const argument = stage === 0 ? common.state : common.stage;
      calls.push(
        { routine: `rodas5p.time${stage}` },
        { routine: `rodas5p.prepare${stage}` },
        { routine: 'rightHandSide', first: argument, second: own.slope },
        { routine: `rodas5p.solve${kind}`, first: own.past, second: own.stages[stage]! },
      );
    }
    calls.push({ routine: 'rodas5p.finish' });
    routines.set(`rodas5p.attempt${kind}`, { kind: 'sequence', calls });
  }
  return routines;
}

/** The argument of a stage and the part of its right-hand side that is known before f. */
function prepareStage(
  system: OdeSystem,
  common: CommonWorkspace,
  own: RosenbrockWorkspace,
  stage: number,
): Routine {
  const loop = new VectorLoop();
  const { graph } = loop;
  if (stage > 0) {
    const row: readonly number[] | undefined = rodas5p.a[stage];
    const argument =
      row === undefined
        ? graph.add(loop.at(common.stage), loop.at(own.stages[stage - 1]!))
        : graph.add(loop.at(common.state), loop.combination(row, own.stages));
    loop.write(common.stage, argument);
  }
  let past = graph.multiply(loop.combination(rodas5p.c[stage]!, own.stages), loop.scalar(slots.inverseStep));
  const timeWeight = rodas5p.timeWeights[stage]!;
  if (system.timeDerivative !== null && timeWeight !== 0) {
    const weight = graph.multiply(graph.constant(timeWeight), loop.scalar(slots.step));
    past = graph.add(past, graph.multiply(weight, loop.at(own.timeDerivative)));
  }
  loop.write(own.past, past);
  return loop.routine(common.dimension);
}

/** The new state, and the squared scaled error: the last K is the difference of the two solutions. */
function finish(common: CommonWorkspace, own: RosenbrockWorkspace): Routine {
  const loop = new VectorLoop();
  const { graph } = loop;
  const last = loop.at(own.stages[rodas5p.stages - 1]!);
  const next = graph.add(loop.at(common.stage), last);
  const scale = loop.scale(common.absoluteTolerance, slots.relativeTolerance, loop.at(common.state), next);
  const error = graph.divide(last, scale);
  loop.write(common.next, next);
  loop.accumulate(slots.error, graph.multiply(error, error));
  return loop.routine(common.dimension);
}

function linearAlgebra(
  system: OdeSystem,
  own: RosenbrockWorkspace,
  symbolic: SymbolicFactorization,
  memory: Float64Array,
): [string, Routine][] {
  const { pattern, dimension } = system;
  const entriesAt = (slot: number): Float64Array => memory.subarray(slot, slot + pattern.columns.length);
  const vectorAt = (slot: number): Float64Array => memory.subarray(slot, slot + dimension);
  const sum = new Float64Array(dimension);
  const withSlope = (past: number): Float64Array => {
    for (let i = 0; i < dimension; i++) sum[i] = memory[past + i]! + memory[own.slope + i]!;
    return sum;
  };
  const pivoting = pivotingSolver(pattern, symbolic.order);
  const fallback: [string, Routine][] = [
    [
      'rodas5p.factorPivoting',
      {
        kind: 'host',
        run: (entries = 0) => {
          const regular = pivoting.factor(entriesAt(entries), memory[slots.shift]!);
          memory[slots.growth] = regular ? 0 : NaN;
        },
      },
    ],
    [
      'rodas5p.solvePivoting',
      {
        kind: 'host',
        run: (past = 0, out = 0) => {
          if (Number.isNaN(memory[slots.growth])) return void vectorAt(out).fill(NaN);
          pivoting.solve(withSlope(past));
          vectorAt(out).set(sum);
        },
      },
    ],
  ];
  if (symbolic.work <= unrolledWork) {
    const factor = unrolledFactor(pattern, symbolic, slots.shift, slots.growth);
    const solve = unrolledSolve(symbolic, own.factors, own.slope);
    return [
      ...fallback,
      ['rodas5p.factor', { kind: 'straight', tapes: [factor] }],
      ['rodas5p.solve', { kind: 'straight', tapes: [solve] }],
    ];
  }
  const table = tableSolver(pattern, symbolic);
  return [
    ...fallback,
    [
      'rodas5p.factor',
      {
        kind: 'host',
        run: (entries = 0) => {
          memory[slots.growth] = table.factor(entriesAt(entries), memory[slots.shift]!);
        },
      },
    ],
    [
      'rodas5p.solve',
      { kind: 'host', run: (past = 0, out = 0) => table.solve(withSlope(past), vectorAt(out)) },
    ],
  ];
}
