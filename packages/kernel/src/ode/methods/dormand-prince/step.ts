import type { Call, Routine } from '../../../program/index.ts';
import { timeSlot } from '../../problem.ts';
import { type CommonWorkspace, slots } from '../../workspace.ts';
import { setTime, VectorLoop } from '../loops.ts';
import { dormandPrince } from './tableau.ts';
import type { ExplicitWorkspace } from './workspace.ts';

/** "dormandPrince.first" computes the slope at the state, "dormandPrince.attempt" the other stages and the error. */
export function explicitRoutines(common: CommonWorkspace, own: ExplicitWorkspace): Map<string, Routine> {
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
    routines.set(`dormandPrince.prepare${stage}`, prepareStage(common, own, stage, argument));
    calls.push(
      { routine: `dormandPrince.time${stage}` },
      { routine: `dormandPrince.prepare${stage}` },
      { routine: 'rightHandSide', first: argument, second: own.slopes[stage]! },
    );
  }
  routines.set('dormandPrince.finish', finish(common, own));
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
): Routine {
  const loop = new VectorLoop();
  const { graph } = loop;
  const change = graph.multiply(
    loop.scalar(slots.step),
    loop.combination(dormandPrince.a[stage]!, own.slopes),
  );
  loop.write(argument, graph.add(loop.at(common.state), change));
  return loop.routine(common.dimension);
}

/**
 * The squared scaled error, and the two lengths whose quotient estimates the largest eigenvalue: the last two stages
 * differ in their arguments and their slopes (Hairer, Wanner, Solving Ordinary Differential Equations II, IV.2).
 */
function finish(common: CommonWorkspace, own: ExplicitWorkspace): Routine {
  const loop = new VectorLoop();
  const { graph } = loop;
  const next = loop.at(common.next);
  const scale = loop.scale(common.absoluteTolerance, slots.relativeTolerance, loop.at(common.state), next);
  const squared = (difference: number): number => {
    const scaled = graph.divide(difference, scale);
    return graph.multiply(scaled, scaled);
  };
  const error = graph.multiply(loop.scalar(slots.step), loop.combination(dormandPrince.error, own.slopes));
  loop.accumulate(slots.error, squared(error));
  const [sixth, seventh] = [own.slopes[5]!, own.slopes[6]!];
  loop.accumulate(slots.slopeChange, squared(graph.subtract(loop.at(seventh), loop.at(sixth))));
  loop.accumulate(slots.stateChange, squared(graph.subtract(next, loop.at(common.stage))));
  return loop.routine(common.dimension);
}
