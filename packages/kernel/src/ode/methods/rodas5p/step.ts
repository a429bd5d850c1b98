import type { Call, Routine } from '../../../program/index.ts';
import { type Elimination, eliminationRoutines } from '../../linear/elimination.ts';
import { timeSlot, type OdeSystem } from '../../problem.ts';
import { type CommonWorkspace, slots } from '../../workspace.ts';
import { type Component, forEachComponent, setTime } from '../loops.ts';
import { rodas5p } from './tableau.ts';
import type { RosenbrockWorkspace } from './workspace.ts';

/**
 * The routines of one step. "rodas5p.linearise" fills Jacobian and ∂f/∂t at the state; "rodas5p.attempt" factorises and
 * runs the stages with a fixed order of pivots, "rodas5p.attemptPivoting" with pivots chosen by size; "rodas5p.dense" fills
 * what the dense output of the step needs.
 */
export function rosenbrockRoutines(
  system: OdeSystem,
  common: CommonWorkspace,
  own: RosenbrockWorkspace,
  elimination: Elimination,
  memory: Float64Array,
): Map<string, Routine> {
  const routines = new Map<string, Routine>();
  const places = { shift: slots.shift, growth: slots.growth, factors: own.factors, addend: own.slope };
  const linearAlgebra = { ...eliminationRoutines(elimination, places, memory) };
  for (const [name, routine] of Object.entries<Routine>(linearAlgebra))
    routines.set(`rodas5p.${name}`, routine);
  for (let stage = 0; stage < rodas5p.stages; stage++) {
    routines.set(`rodas5p.time${stage}`, setTime(timeSlot, slots.start, slots.step, rodas5p.times[stage]!));
    const prepare = prepareStage(system, common, own, stage);
    routines.set(`rodas5p.prepare${stage}`, forEachComponent(common.dimension, prepare));
  }
  routines.set('rodas5p.finish', forEachComponent(common.dimension, finish(common, own)));
  routines.set('rodas5p.dense', forEachComponent(common.dimension, dense(own)));
  const linearise: Call[] = [
    { routine: 'rodas5p.time0' },
    { routine: 'jacobian', first: common.state, second: common.jacobian },
  ];
  if (system.timeDerivative !== null) {
    routines.set('rodas5p.timeDerivative', { kind: 'straight', tapes: system.timeDerivative });
    linearise.push({ routine: 'rodas5p.timeDerivative', first: common.state, second: own.timeDerivative });
  }
  routines.set('rodas5p.linearise', { kind: 'sequence', calls: linearise });
  for (const kind of ['', 'Pivoting']) {
    const calls: Call[] = [{ routine: `rodas5p.factor${kind}`, first: common.jacobian, second: own.factors }];
    for (let stage = 0; stage < rodas5p.stages; stage++) {
      const argument = stage === 0 ? common.state : common.stage;
      if (system.timeDependent) calls.push({ routine: `rodas5p.time${stage}` });
      calls.push(
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
): (component: Component) => void {
  return (component) => {
    const { graph } = component;
    if (stage > 0) {
      const row: readonly number[] | undefined = rodas5p.a[stage];
      const argument =
        row === undefined
          ? graph.add(component.at(common.stage), component.at(own.stages[stage - 1]!))
          : graph.add(component.at(common.state), component.combination(row, own.stages));
      component.write(common.stage, argument);
    }
    const sum = component.combination(rodas5p.c[stage]!, own.stages);
    let past = graph.multiply(sum, component.scalar(slots.inverseStep));
    const timeWeight = rodas5p.timeWeights[stage]!;
    if (system.timeDerivative !== null && timeWeight !== 0) {
      const weight = graph.multiply(graph.constant(timeWeight), component.scalar(slots.step));
      past = graph.add(past, graph.multiply(weight, component.at(own.timeDerivative)));
    }
    component.write(own.past, past);
  };
}

/** The new state, and the squared scaled error: the last K is the difference of the two solutions. */
function finish(common: CommonWorkspace, own: RosenbrockWorkspace): (component: Component) => void {
  return (component) => {
    const { graph } = component;
    const last = component.at(own.stages[rodas5p.stages - 1]!);
    const next = graph.add(component.at(common.stage), last);
    const state = component.at(common.state);
    const error = graph.divide(
      last,
      component.scale(common.absoluteTolerance, slots.relativeTolerance, state, next),
    );
    component.write(common.next, next);
    component.accumulate(slots.error, graph.multiply(error, error));
  };
}

/** The vectors D_r of the dense output. */
function dense(own: RosenbrockWorkspace): (component: Component) => void {
  return (component) => {
    rodas5p.dense.forEach((weights, r) => {
      component.write(own.dense[r]!, component.combination(weights, own.stages));
    });
  };
}
