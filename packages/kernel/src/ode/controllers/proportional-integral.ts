import { clamp, type Controller } from './controller.ts';
import { fifthRoot } from './fifth-root.ts';

const safety = 0.9;
const leastFactor = 0.2;
const mostFactor = 10;
/** Errors below this count as this, so that one lucky step does not decide the next. */
const leastError = 1e-4;

/**
 * PI control for methods whose error is of order h^5: h' = h · safety · e^(−3/25) · e_old^(1/25) (the controller PI.4.2:
 * Söderlind, Wang 2006; Gustafsson 1991).
 */
export function proportionalIntegral(): Controller {
  let oldError = 1;
  let rejected = false;
  return {
    accept(h, error) {
      const least = Math.max(error, leastError);
      const factor = safety * fifthRoot(fifthRoot(oldError / (least * least * least)));
      oldError = least;
      const step = h * clamp(factor, leastFactor, rejected ? 1 : mostFactor);
      rejected = false;
      return step;
    },
    reject(h, error) {
      rejected = true;
      return h * clamp(safety / fifthRoot(error), leastFactor, 1);
    },
    reset() {
      oldError = 1;
      rejected = false;
    },
  };
}
