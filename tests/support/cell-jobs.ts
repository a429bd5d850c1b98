import type { CellInput, CellJob, CellKind, CellOutcome, CellSettings } from '@stillroom/shared/cells';
import { evaluateCell, type EngineControl } from '@stillroom/kernel/engine';
import { digestOf } from '@stillroom/shared/plan';

/** A result to draw on. */
export const drawn = (kind: CellKind, result: unknown, text = ''): CellInput => ({
  kind,
  digest: digestOf({ kind, result, text }),
  text,
  result,
});

/** A job with what was not said filled in. */
export function jobOf(
  kind: CellKind,
  text: string,
  inputs: Readonly<Record<string, CellInput>> = {},
  settings: CellSettings = {},
): CellJob {
  return { digest: digestOf({ kind, text, settings }), kind, text, settings, inputs };
}

const freely: EngineControl = { checkpoint: () => undefined };

/** Evaluates a job that must succeed. */
export function resultOf<T>(job: CellJob, control = freely): T {
  const outcome = evaluateCell(job, control);
  if (outcome.status === 'failed') throw new Error(`failed: ${outcome.error.message}`);
  return outcome.result as T;
}

/** Evaluates a job that must fail. */
export function errorOf(job: CellJob, control = freely): Extract<CellOutcome, { status: 'failed' }>['error'] {
  const outcome = evaluateCell(job, control);
  if (outcome.status === 'ok') throw new Error(`did not fail: ${JSON.stringify(outcome.result)}`);
  return outcome.error;
}

/** A course as a trajectory cell leaves it. */
export const course = {
  times: [0, 1, 2, 4],
  species: { P: [0, 4, 7.5, 9.8765], 'X[3]': [1, 1, 1, 1] },
  derived: { ratio: [0, 0.5, 0.75, null] },
  statistics: { steps: 12, rejected: 1, rhs: 80, jacobians: 0, factorizations: 0, method: 'x' },
  conservationDrift: 1e-16,
  ended: 'complete',
  units: { time: 's', amount: 'uM', volume: null },
};
