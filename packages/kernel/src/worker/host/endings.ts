import type { CellOutcome, EndedBy } from '@stillroom/shared/cells';

/** Seconds as a sentence has them: "60 s", "0.25 s". */
const secondsText = (seconds: number): string => `${Number(seconds.toPrecision(3))} s`;

/**
 * The outcome of a run that was ended without leaving anything.
 *
 * @param deadline seconds it was allowed
 */
export function endedOutcome(by: EndedBy, deadline: number): CellOutcome {
  const error = {
    deadline: {
      message: `The time allowed, ${secondsText(deadline)}, is over.`,
      hint: 'Make what is computed smaller, or allow more time.',
    },
    stop: { message: 'The run was stopped.', hint: 'Bring the cell up to date to run it again.' },
    memory: {
      message: 'It needs more memory than a cell may use.',
      hint: 'Make what is computed smaller.',
    },
    crash: {
      message: 'The engine broke off while computing this cell.',
      hint: 'Bring the cell up to date to run it again; if it breaks off again, this is a fault of the engine.',
    },
  }[by];
  return { status: 'failed', error, warnings: [], keep: false };
}
