import type { Assembly } from '../../../program/index.ts';
import type { CommonWorkspace } from '../../workspace.ts';
import type { RosenbrockWorkspace } from './workspace.ts';

/** Dense output of the step whose stages stand in memory; the vectors D_r are made once per step. */
export function rosenbrockInterpolant(
  assembly: Assembly,
  common: CommonWorkspace,
  own: RosenbrockWorkspace,
): { invalidate(): void; at(theta: number, out: Float64Array): void } {
  const { memory } = assembly;
  const fill = assembly.routine('rodas5p.dense');
  const n = common.dimension;
  const vector = (slot: number): Float64Array => memory.subarray(slot, slot + n);
  const state = vector(common.state);
  const next = vector(common.next);
  const [d1, d2, d3] = own.dense.map(vector);
  let ready = false;
  return {
    invalidate() {
      ready = false;
    },
    at(theta, out) {
      if (!ready) fill();
      ready = true;
      const rest = 1 - theta;
      for (let i = 0; i < n; i++) {
        const bend = d1![i]! + theta * (d2![i]! + theta * d3![i]!);
        out[i] = rest * state[i]! + theta * (next[i]! + rest * bend);
      }
    },
  };
}
