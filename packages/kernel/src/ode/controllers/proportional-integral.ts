import { elementary } from '@stillroom/shared/expression';
import { clamp, type Controller } from './controller.ts';

const stabilisation = 0.04;
const safety = 0.9;
const leastFactor = 0.2;
const mostFactor = 10;

/**
 * h' = h · safety · e^(−α) · e_old^β with β = 0.04 and α = 1/q − 3β/4, q the power of h in the error (Gustafsson 1991;
 * constants of Hairer, Nørsett, Wanner, Solving Ordinary Differential Equations I, IV.2).
 */
export function proportionalIntegral(power: number): Controller {
  const exponent = 1 / power - stabilisation * 0.75;
  let oldError = 1e-4;
  let rejected = false;
  return {
    accept(h, error) {
      const raw = elementary.pow(error, exponent) / elementary.pow(oldError, stabilisation);
      const factor = clamp(raw / safety, 1 / mostFactor, 1 / leastFactor);
      oldError = Math.max(error, 1e-4);
      const next = h / factor;
      const step = rejected ? Math.min(next, h) : next;
      rejected = false;
      return step;
    },
    reject(h, error) {
      rejected = true;
      return h / Math.min(1 / leastFactor, elementary.pow(error, exponent) / safety);
    },
    reset() {
      oldError = 1e-4;
      rejected = false;
    },
  };
}
