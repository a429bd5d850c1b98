import type { CellInput, CellJob } from '@stillroom/shared/cells';
import { CellFailure } from './failure.ts';

/** The cell that a job draws on under a name; undefined where the job was given none. */
export function inputOf(job: CellJob, name: string): CellInput | undefined {
  return Object.hasOwn(job.inputs, name) ? job.inputs[name] : undefined;
}

/** As `inputOf`, for a result that must be there. */
export function resultOf(job: CellJob, name: string): { input: CellInput; result: unknown } {
  const input = inputOf(job, name);
  if (input === undefined) throw new CellFailure(`There is no cell called ${name}.`);
  if (input.failed !== undefined) {
    throw new CellFailure(`It draws on ${name}, which failed.`, { hint: input.failed.message });
  }
  if (input.result === undefined) throw new CellFailure(`${name} has no result yet.`);
  return { input, result: input.result };
}
