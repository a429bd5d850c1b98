import type { Assembly } from '../../../program/index.ts';
import { predictive } from '../../controllers/predictive.ts';
import { planElimination } from '../../linear/elimination.ts';
import { type CommonWorkspace, slots } from '../../workspace.ts';
import type { Counters, Method, Stepper } from '../method.ts';
import { copyVector } from '../loops.ts';
import { rosenbrockInterpolant } from './interpolant.ts';
import { rosenbrockRoutines } from './step.ts';
import { rodas5p } from './tableau.ts';
import { type RosenbrockWorkspace, rosenbrockWorkspace } from './workspace.ts';

/** Multipliers of the factorisation beyond this mean that the fixed order of pivots has lost too many digits. */
const largestMultiplier = 1e6;
/** For how many steps pivots are chosen by size after the fixed order has failed. */
const pivotingSteps = 10;

/** The method for stiff systems. */
export const rodas5pMethod: Method = {
  name: 'Rodas5P',
  citation: 'Steinebach 2023, BIT Numerical Mathematics 63:27',
  order: 5,
  denseOrder: 4,
  stiff: true,
  errorPower: 5,
  controller: predictive,
  prepare(system, common, layout, checkpoint) {
    const elimination = planElimination(system.pattern, checkpoint);
    const own = rosenbrockWorkspace(system, elimination, layout);
    return {
      routines: (memory) => rosenbrockRoutines(system, common, own, elimination, memory),
      stepper: (assembly, counters) => stepper(common, own, assembly, counters),
    };
  },
};

function stepper(
  common: CommonWorkspace,
  own: RosenbrockWorkspace,
  assembly: Assembly,
  counters: Counters,
): Stepper {
  const { memory } = assembly;
  const n = common.dimension;
  const linearise = assembly.routine('rodas5p.linearise');
  const attempt = assembly.routine('rodas5p.attempt');
  const attemptPivoting = assembly.routine('rodas5p.attemptPivoting');
  const interpolant = rosenbrockInterpolant(assembly, common, own);
  let linear = false;
  let pivoting = 0;

  const run = (routine: () => void): void => {
    memory[slots.error] = 0;
    counters.factorizations++;
    counters.rhs += rodas5p.stages;
    routine();
  };

  return {
    restart() {
      linear = false;
      pivoting = 0;
    },
    attempt(t, h) {
      memory[slots.start] = t;
      memory[slots.step] = h;
      memory[slots.inverseStep] = 1 / h;
      memory[slots.shift] = 1 / (h * rodas5p.gamma);
      interpolant.invalidate();
      if (!linear) {
        linearise();
        counters.jacobians++;
        linear = true;
      }
      if (pivoting === 0) {
        run(attempt);
        if (!(memory[slots.growth]! <= largestMultiplier)) pivoting = pivotingSteps;
      }
      if (pivoting > 0) {
        pivoting--;
        run(attemptPivoting);
      }
      return n === 0 ? 0 : Math.sqrt(memory[slots.error]! / n);
    },
    interpolate: (theta, out) => interpolant.at(theta, out),
    accept() {
      copyVector(memory, common.state, common.next, n);
      linear = false;
    },
  };
}
