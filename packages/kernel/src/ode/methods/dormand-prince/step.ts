import type { Call, Node, Routine } from '../../../program/index.ts';
import { timeSlot, type OdeSystem } from '../../problem.ts';
import { type CommonWorkspace, slots } from '../../workspace.ts';
import { type Component, forEachComponent, setTime } from '../loops.ts';
import { dormandPrince } from './tableau.ts';
import type { ExplicitWorkspace } from './workspace.ts';

/** "dormandPrince.first" computes the slope at the state, "dormandPrince.attempt" the other stages and the error. */
export function explicitRoutines(
  system: OdeSystem,
  common: CommonWorkspace,
  own: ExplicitWorkspace,
): Map<string, Routine> {
  const routines = new Map<string, Routine>();
  const last = dormandPrince.stages - 1;
  const calls: Call[] = [];
  for (let stage = 0; stage <= last; stage++) {
    routines.set(
      `dormandPrince.time${stage}`,
      setTime(timeSlot, slots.start, slots.step, dormandPrince.times[stage]!),
    );
    if (stage === 0) continue;
    const argument = stage === last ? common.next : common.stage;
    const prepare = prepareStage(common, own, stage, argument);
    routines.set(`dormandPrince.prepare${stage}`, forEachComponent(common.dimension, prepare));
    if (system.timeDependent) calls.push({ routine: `dormandPrince.time${stage}` });
    calls.push(
      { routine: `dormandPrince.prepare${stage}` },
      { routine: 'rightHandSide', first: argument, second: own.slopes[stage]! },
    );
  }
  routines.set('dormandPrince.finish', forEachComponent(common.dimension, finish(common, own)));
  routines.set('dormandPrince.first', {
    kind: 'sequence',
    calls: [
      { routine: 'dormandPrince.time0' },
      { routine: 'rightHandSide', first: common.state, second: own.slopes[0]! },
    ],
  });
  routines.set('dormandPrince.attempt', {
    kind: 'sequence',
    calls: [...calls, { routine: 'dormandPrince.finish' }],
  });
  return routines;
}

function prepareStage(
  common: CommonWorkspace,
  own: ExplicitWorkspace,
  stage: number,
  argument: number,
): (component: Component) => void {
  return (component) => {
    const { graph } = component;
    const slope = component.combination(dormandPrince.a[stage]!, own.slopes);
    const change = graph.multiply(component.scalar(slots.step), slope);
    component.write(argument, graph.add(component.at(common.state), change));
  };
}

/**
 * The squared scaled error, and the two lengths whose quotient estimates the largest eigenvalue: the last two stages
 * differ in their arguments and their slopes (Hairer, Wanner, Solving Ordinary Differential Equations II, IV.2).
 */
function finish(common: CommonWorkspace, own: ExplicitWorkspace): (component: Component) => void {
  return (component) => {
    const { graph } = component;
    const next = component.at(common.next);
    const state = component.at(common.state);
    const scale = component.scale(common.absoluteTolerance, slots.relativeTolerance, state, next);
    const squared = (difference: Node): Node => {
      const scaled = graph.divide(difference, scale);
      return graph.multiply(scaled, scaled);
    };
    const slope = component.combination(dormandPrince.error, own.slopes);
    component.accumulate(slots.error, squared(graph.multiply(component.scalar(slots.step), slope)));
    const [sixth, seventh] = [component.at(own.slopes[5]!), component.at(own.slopes[6]!)];
    component.accumulate(slots.slopeChange, squared(graph.subtract(seventh, sixth)));
    component.accumulate(slots.stateChange, squared(graph.subtract(next, component.at(common.stage))));
  };
}
