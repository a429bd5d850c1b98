import type { Assembly } from '../../../program/index.ts';
import { proportionalIntegral } from '../../controllers/proportional-integral.ts';
import { type CommonWorkspace, slots } from '../../workspace.ts';
import type { Counters, Method, Stepper } from '../method.ts';
import { copyVector } from '../loops.ts';
import { explicitInterpolant } from './interpolant.ts';
import { explicitRoutines } from './step.ts';
import { dormandPrince } from './tableau.ts';
import { type ExplicitWorkspace, explicitWorkspace } from './workspace.ts';

/** The method for systems that are not stiff. */
export const dormandPrinceMethod: Method = {
  name: 'Dormand–Prince 5(4)',
  citation: 'Dormand, Prince 1980, Journal of Computational and Applied Mathematics 6',
  order: 5,
  denseOrder: 4,
  stiff: false,
  errorPower: 5,
  controller: proportionalIntegral,
  prepare(system, common, layout) {
    const own = explicitWorkspace(system, layout);
    return {
      routines: () => explicitRoutines(system, common, own),
      stepper: (assembly, counters) => stepper(common, own, assembly, counters),
    };
  },
};

function stepper(
  common: CommonWorkspace,
  own: ExplicitWorkspace,
  assembly: Assembly,
  counters: Counters,
): Stepper {
  const { memory } = assembly;
  const n = common.dimension;
  const first = assembly.routine('dormandPrince.first');
  const attempt = assembly.routine('dormandPrince.attempt');
  const interpolant = explicitInterpolant(memory, common, own);
  const last = own.slopes[dormandPrince.stages - 1]!;
  let started = false;
  let lastStep = 0;
  return {
    restart() {
      started = false;
    },
    attempt(t, h) {
      memory[slots.start] = t;
      memory[slots.step] = h;
      memory[slots.error] = 0;
      memory[slots.slopeChange] = 0;
      memory[slots.stateChange] = 0;
      if (!started) {
        first();
        counters.rhs++;
        started = true;
      }
      attempt();
      counters.rhs += dormandPrince.stages - 1;
      interpolant.begin(h);
      lastStep = h;
      return n === 0 ? 0 : Math.sqrt(memory[slots.error]! / n);
    },
    interpolate: (theta, out) => interpolant.at(theta, out),
    accept() {
      copyVector(memory, common.state, common.next, n);
      copyVector(memory, own.slopes[0]!, last, n);
    },
    stiffness() {
      const change = memory[slots.stateChange]!;
      return change > 0 ? lastStep * Math.sqrt(memory[slots.slopeChange]! / change) : 0;
    },
  };
}
