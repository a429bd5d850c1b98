import { prepareSystem } from '@stillroom/kernel/ode';
import type { MethodKind } from '@stillroom/kernel/ode';
import { odeSystem, rateEquations, resolveValues } from '@stillroom/kernel/rates';
import type { Network } from '@stillroom/shared/network';

/** Errors of a method with fixed steps on a network of one species whose course is known. */
export interface FixedStepErrors {
  /** At the end of [0, 1]. */
  readonly end: number;
  /** The largest inside the first step, from dense output. */
  readonly inside: number;
}

/** Integrates over [0, 1] with `steps` equal steps. */
export function fixedStepErrors(
  network: Network,
  kind: MethodKind,
  steps: number,
  exact: (t: number) => number,
): FixedStepErrors {
  const equations = rateEquations(network, resolveValues(network, {}));
  const prepared = prepareSystem(odeSystem(equations), { kinds: [kind] });
  prepared.setParameters(equations.parameterValues);
  const { state, absoluteTolerance } = prepared.common;
  prepared.vector(absoluteTolerance).fill(1);
  prepared.vector(state)[0] = exact(0);
  const stepper = prepared.stepper(kind, { rhs: 0, jacobians: 0, factorizations: 0 });
  const h = 1 / steps;
  let inside = 0;
  stepper.restart();
  for (let step = 0; step < steps; step++) {
    stepper.attempt(step * h, h);
    if (step === 0) {
      const between = new Float64Array(1);
      for (let part = 1; part < 16; part++) {
        stepper.interpolate(part / 16, between);
        inside = Math.max(inside, Math.abs(between[0]! - exact((h * part) / 16)));
      }
    }
    stepper.accept();
  }
  return { end: Math.abs(prepared.vector(state)[0]! - exact(1)), inside };
}

/** log2 of the quotient of two errors: the order seen when the step is halved. */
export function observedOrder(coarse: number, fine: number): number {
  return Math.log2(coarse / fine);
}
