import { elementary } from '@stillroom/shared/expression';
import { clamp, type Controller } from './controller.ts';

const safety = 0.9;
const leastFactor = 0.2;
const mostFactor = 10;

/**
 * Predictive control for stiff methods: besides h · safety · e^(−1/q) it follows the trend of the last two steps,
 * h · (h/h_old) · (e_old/e²)^(1/q) · safety, and takes the smaller (Gustafsson 1994; Hairer, Wanner, Solving Ordinary
 * Differential Equations II, IV.8).
 */
export function predictive(power: number): Controller {
  const exponent = 1 / power;
  let oldStep = 0;
  let oldError = 0;
  let rejected = false;
  const bounded = (factor: number): number => clamp(factor / safety, 1 / mostFactor, 1 / leastFactor);
  return {
    accept(h, error) {
      let factor = bounded(elementary.pow(error, exponent));
      if (oldStep > 0) {
        const trend = (oldStep / h) * elementary.pow((error * error) / oldError, exponent);
        factor = Math.max(factor, bounded(trend));
      }
      oldStep = h;
      oldError = Math.max(error, 0.01);
      const next = h / factor;
      const step = rejected ? Math.min(next, h) : next;
      rejected = false;
      return step;
    },
    reject(h, error) {
      rejected = true;
      return h / bounded(elementary.pow(error, exponent));
    },
    reset() {
      oldStep = 0;
      rejected = false;
    },
  };
}
