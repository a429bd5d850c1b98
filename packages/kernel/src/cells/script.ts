import { type CellJob, type ScriptResult, scriptSettings } from '@stillroom/shared/cells';
import type * as z from 'zod/mini';
import { type EngineControl, StopRequested } from '../engine/control.ts';
import type { Evaluated } from '../engine/evaluated.ts';
import { CellFailure } from '../engine/failure.ts';
import { resultOf } from '../engine/inputs.ts';
import type { ScriptEngine } from '../script/script-engine.ts';

/** Runs the script until it ends or the control asks it to. */
function runScript(
  job: CellJob,
  control: EngineControl,
  scripts: ScriptEngine,
  globals: Record<string, unknown>,
) {
  let stop: StopRequested | null = null;
  const interrupt = () => {
    try {
      control.checkpoint();
      return false;
    } catch (error) {
      if (!(error instanceof StopRequested)) throw error;
      stop = error;
      return true;
    }
  };
  const run = scripts.run(job.text, globals, job.digest.replace(/^sha256:/u, ''), interrupt);
  return { run, stop: stop as StopRequested | null };
}

/**
 * Runs a script over the results of the cells it draws on, in the sandbox of `control`. `random()` begins with the digest
 * of the cell, so that the same script over the same results gives the same value.
 *
 * A script that throws has failed with its place in the text; what it printed before is its result still.
 *
 * @throws CellFailure where scripts cannot be run, or a cell it draws on failed
 */
export function evaluateScript(job: CellJob, control: EngineControl): Evaluated {
  const { scripts } = control;
  if (scripts === undefined) throw new CellFailure('Scripts cannot be run here.');
  const { draws = [] } = scriptSettings.parse(job.settings) as z.infer<typeof scriptSettings>;
  const globals = Object.fromEntries(
    draws.map((name) => [name, resultOf(job, name.normalize('NFC')).result]),
  );
  const { run, stop } = runScript(job, control, scripts, globals);
  const printed = (value: unknown): ScriptResult => ({ printed: run.printed, value });
  switch (run.ended) {
    case 'returned':
      return { result: printed(run.value), warnings: run.notes };
    case 'interrupted':
      return {
        result: printed(null),
        ended: {
          message: stop?.message ?? 'The script was ended.',
          hint: 'Look for a loop that does not end.',
        },
      };
    case 'memory':
      return {
        result: printed(null),
        ended: {
          message: 'The script used up the memory of its sandbox.',
          hint: 'Keep fewer values at a time.',
        },
      };
    case 'threw':
      return {
        result: printed(null),
        failed: {
          message: run.message,
          ...(run.line === undefined ? {} : { line: run.line }),
          ...(run.column === undefined ? {} : { column: run.column }),
        },
      };
  }
}
