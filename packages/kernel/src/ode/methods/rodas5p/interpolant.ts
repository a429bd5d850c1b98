import type { CommonWorkspace } from '../../workspace.ts';
import { rodas5p } from './tableau.ts';
import type { RosenbrockWorkspace } from './workspace.ts';

/** Dense output of the step whose stages stand in memory; the vectors D_r are made once per step. */
export function rosenbrockInterpolant(
  memory: Float64Array,
  common: CommonWorkspace,
  own: RosenbrockWorkspace,
): { invalidate(): void; at(theta: number, out: Float64Array): void } {
  const n = common.dimension;
  const dense = rodas5p.dense.map(() => new Float64Array(n));
  let ready = false;
  const fill = (): void => {
    rodas5p.dense.forEach((weights, r) => {
      const vector = dense[r]!;
      for (let i = 0; i < n; i++) {
        let sum = 0;
        for (let s = 0; s < weights.length; s++) sum += weights[s]! * memory[own.stages[s]! + i]!;
        vector[i] = sum;
      }
    });
    ready = true;
  };
  return {
    invalidate() {
      ready = false;
    },
    at(theta, out) {
      if (!ready) fill();
      const [d1, d2, d3] = dense;
      const rest = 1 - theta;
      for (let i = 0; i < n; i++) {
        const bend = d1![i]! + theta * (d2![i]! + theta * d3![i]!);
        out[i] = rest * memory[common.state + i]! + theta * (memory[common.next + i]! + rest * bend);
      }
    },
  };
}
