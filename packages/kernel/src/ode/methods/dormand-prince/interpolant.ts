import type { CommonWorkspace } from '../../workspace.ts';
import { dormandPrince } from './tableau.ts';
import type { ExplicitWorkspace } from './workspace.ts';

/**
 * Dense output y(θ) = r_1 + θ(r_2 + (1−θ)(r_3 + θ(r_4 + (1−θ) r_5))) with r_1 = y_0, r_2 = y_1 − y_0, r_3 = h f_0 − r_2,
 * r_4 = r_2 − h f_1 − r_3, r_5 = h Σ d_i k_i.
 */
export function explicitInterpolant(
  memory: Float64Array,
  common: CommonWorkspace,
  own: ExplicitWorkspace,
): { begin(h: number): void; at(theta: number, out: Float64Array): void } {
  const n = common.dimension;
  const fifth = new Float64Array(n);
  const weights = dormandPrince.dense;
  let step = 0;
  let ready = false;
  const fill = (): void => {
    for (let i = 0; i < n; i++) {
      let sum = 0;
      for (let s = 0; s < weights.length; s++) sum += weights[s]! * memory[own.slopes[s]! + i]!;
      fifth[i] = step * sum;
    }
    ready = true;
  };
  return {
    begin(h) {
      step = h;
      ready = false;
    },
    at(theta, out) {
      if (!ready) fill();
      const rest = 1 - theta;
      for (let i = 0; i < n; i++) {
        const start = memory[common.state + i]!;
        const change = memory[common.next + i]! - start;
        const third = step * memory[own.slopes[0]! + i]! - change;
        const fourth = change - step * memory[own.slopes[6]! + i]! - third;
        out[i] = start + theta * (change + rest * (third + theta * (fourth + rest * fifth[i]!)));
      }
    },
  };
}
