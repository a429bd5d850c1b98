import type { CellError, CellJob, CellKind, CellOutcome } from '@stillroom/shared/cells';
import { digestOf } from '@stillroom/shared/plan';
import { evaluateClaim } from '../cells/claim.ts';
import { evaluateBalance } from '../cells/evaluate-balance.ts';
import { evaluateNetwork } from '../cells/evaluate-network.ts';
import { evaluateStructure } from '../cells/evaluate-structure.ts';
import { evaluateTrajectoryCell } from '../cells/evaluate-trajectory.ts';
import { evaluatePlot } from '../cells/plot.ts';
import { evaluateProse } from '../cells/prose.ts';
import { evaluateScript } from '../cells/script.ts';
import { type EngineControl, StopRequested } from './control.ts';
import type { Evaluated } from './evaluated.ts';
import { CellFailure } from './failure.ts';

type Evaluator = (job: CellJob, control: EngineControl) => Evaluated;

const evaluators: Readonly<Record<CellKind, Evaluator>> = {
  prose: (job) => ({ result: evaluateProse(job) }),
  network: evaluateNetwork,
  structure: evaluateStructure,
  balance: evaluateBalance,
  trajectory: evaluateTrajectoryCell,
  claim: (job) => ({ result: evaluateClaim(job) }),
  plot: evaluatePlot,
  script: evaluateScript,
};

/** Whether a run stands before this one that was ended from outside, so that another time it may come out otherwise. */
const restsOnFailure = (job: CellJob): boolean =>
  Object.values(job.inputs).some(({ failed, digest }) => failed !== undefined && digest !== null);

const failed = (error: CellError, keep: boolean): CellOutcome => ({
  status: 'failed',
  error,
  warnings: [],
  keep,
});

function complete(job: CellJob, { result, warnings = [], ended, failed: why }: Evaluated): CellOutcome {
  if (ended !== undefined) {
    return { status: 'failed', error: ended, result, partial: true, warnings, keep: false };
  }
  if (why !== undefined) return { ...failed(why, !restsOnFailure(job)), result, warnings };
  return { status: 'ok', result, resultDigest: digestOf(result), warnings, keep: !restsOnFailure(job) };
}

function failureOf(error: unknown, job: CellJob): CellOutcome {
  if (error instanceof CellFailure) return failed(error.words, !restsOnFailure(job));
  if (error instanceof StopRequested) return failed({ message: error.message }, false);
  if (error instanceof RangeError) {
    return failed(
      { message: 'It needs more memory than there is.', hint: 'Make what is computed smaller.' },
      false,
    );
  }
  const words = error instanceof Error ? error.message : String(error);
  return failed({ message: `The engine came upon a fault of its own: ${words}` }, false);
}

/**
 * Computes one cell. Pure: the same job gives the same bytes, whatever the machine, the time and the runs before. Never
 * throws: what goes wrong is a failed outcome in words.
 *
 * @param job the cell, its settings and what it draws on
 * @param control told how far the run is, and able to end it
 */
export function evaluateCell(job: CellJob, control: EngineControl): CellOutcome {
  try {
    control.checkpoint();
    return complete(job, evaluators[job.kind](job, control));
  } catch (error) {
    return failureOf(error, job);
  }
}
