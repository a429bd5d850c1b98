import type { CellJob } from '@stillroom/shared/cells';
import { evaluateCell } from '../engine/index.ts';

/** A small stiff course with a conservation law: both methods, the linear algebra and the reading of a network take part. */
const job: CellJob = {
  digest: 'sha256:',
  kind: 'trajectory',
  text: '',
  settings: { network: 'network', until: 100 },
  inputs: {
    network: {
      kind: 'network',
      digest: 'sha256:',
      text: 'A + B <=> C | 2, 1\nC + D -> 2 E | 1000\nE -> A + F | 0.001\nF -> B | 5\nG <=> D | 1, 3\nstart A = 1, B = 2, G = 3\n',
      result: null,
    },
  },
};

/** Milliseconds without a job before the first course, so that a job that is waiting goes first. */
const patience = 25;
/** After so many courses more of them gain little. */
const courses = 6;

/**
 * Computes a small course a few times while nothing else is to be done, so that the engine's code is compiled when the
 * first job comes: the first course of a process otherwise takes several times as long as the next. Returns what ends it.
 */
export function warmUp(): () => void {
  let left = courses;
  let ended = false;
  const next = (): void => {
    if (ended) return;
    evaluateCell(job, { checkpoint: () => undefined });
    left--;
    if (left > 0) setImmediate(next).unref();
  };
  const timer = setTimeout(next, patience);
  timer.unref();
  return () => {
    ended = true;
    clearTimeout(timer);
  };
}
