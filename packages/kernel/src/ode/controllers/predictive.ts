import { clamp, type Controller } from './controller.ts';
import { fifthRoot } from './fifth-root.ts';

const safety = 0.9;
const leastFactor = 0.2;
const mostFactor = 10;
/** The fifth root of 0.01: smaller errors count as 0.01 when the trend is followed. */
const leastRoot = 0.3981071705534972;

/**
 * Predictive control for stiff methods whose error is of order h^5: besides h · safety · e^(−1/5) it follows the trend of
 * the last two steps, h · safety · (h/h_old) · (e_old/e²)^(1/5), and takes the smaller (Gustafsson 1994; Hairer, Wanner,
 * Solving Ordinary Differential Equations II, IV.8).
 */
export function predictive(): Controller {
  let oldStep = 0;
  let oldRoot = 0;
  let rejected = false;
  const bounded = (factor: number): number => clamp(safety * factor, leastFactor, mostFactor);
  return {
    accept(h, error) {
      const root = fifthRoot(error);
      let factor = bounded(1 / root);
      if (oldStep > 0) factor = Math.min(factor, bounded(((h / oldStep) * oldRoot) / (root * root)));
      oldStep = h;
      oldRoot = Math.max(root, leastRoot);
      const step = h * (rejected ? Math.min(factor, 1) : factor);
      rejected = false;
      return step;
    },
    reject(h, error) {
      rejected = true;
      return h * bounded(1 / fifthRoot(error));
    },
    reset() {
      oldStep = 0;
      rejected = false;
    },
  };
}
