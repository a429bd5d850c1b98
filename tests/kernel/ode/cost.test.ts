import { evaluateTrajectory } from '@stillroom/kernel/cells';
import { expect, test } from 'vitest';
import table from '../../reference/dynamics.json' with { type: 'json' };
import { networkOf, type PlainNetwork } from '../../support/network-of.ts';

/**
 * Steps and evaluations at the default tolerance, measured and rounded up by a tenth: a change of control or method that
 * costs more shows here.
 */
const bounds = [
  ['ivp_hires', 'stiff', { steps: 262, rejected: 3, rhs: 2110 }],
  ['ivp_orego', 'stiff', { steps: 1020, rejected: 14, rhs: 8230 }],
  ['ivp_rober', 'stiff', { steps: 285, rejected: 8, rhs: 2340 }],
  ['ivp_pollu', 'stiff', { steps: 93, rejected: 9, rhs: 805 }],
  ['mapk_cascade', 'auto', { steps: 406, rejected: 4, rhs: 3230 }],
  ['brusselator_limit_cycle', 'nonstiff', { steps: 167, rejected: 20, rhs: 1115 }],
  ['sir_outbreak', 'nonstiff', { steps: 95, rejected: 2, rhs: 572 }],
] as const;

test.each(bounds)('%s by method %s', (id, method, most) => {
  const problem = table.entries.find((entry) => entry.id === id)!.problem as unknown as PlainNetwork & {
    t_end?: number;
    times?: number[];
  };
  const until = problem.t_end ?? problem.times!.at(-1)!;
  const { statistics } = evaluateTrajectory(networkOf(problem), { network: 'n', until, method });
  expect(statistics.steps).toBeLessThanOrEqual(most.steps);
  expect(statistics.rejected).toBeLessThanOrEqual(most.rejected);
  expect(statistics.rhs).toBeLessThanOrEqual(most.rhs);
});
