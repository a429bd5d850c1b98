import type { CellJob } from '@stillroom/shared/cells';
import { parsePath, type PathStep, printPath, resolvePath, unitAt } from '@stillroom/shared/paths';
import { CellFailure } from '../engine/failure.ts';
import { resultOf } from '../engine/inputs.ts';

/** A list of a result that can be drawn. */
export interface Column {
  readonly values: readonly (number | string | null)[];
  readonly unit: string | null;
  /** Last name of its path. */
  readonly label: string;
}

/** Steps of a path within the result of `cell`; one that begins with the cell's own name counts from there. */
function stepsWithin(text: string, cell: string, result: unknown): readonly PathStep[] {
  const read = parsePath(text);
  if (!read.ok) {
    throw new CellFailure(`"${text}" is no path: ${read.misreading.message}`, {
      hint: 'Write a place in the result of the cell, such as times or species.P.',
    });
  }
  const { head, steps } = read.value;
  const whole = [head, ...steps];
  return head === cell && !resolvePath(result, { head, steps: whole.slice(0, 1) }).found ? steps : whole;
}

/**
 * The list at a path within the result of a cell.
 *
 * @throws CellFailure where the path cannot be read, leads nowhere, or leads to no list
 */
export function columnAt(job: CellJob, cell: string, text: string): Column {
  const { input, result } = resultOf(job, cell.normalize('NFC'));
  const steps = stepsWithin(text, cell, result);
  const found = resolvePath(result, { head: cell, steps });
  if (!found.found) throw new CellFailure(found.message, found.hint === null ? {} : { hint: found.hint });
  if (!Array.isArray(found.value)) {
    throw new CellFailure(`${printPath(cell, steps)} is no list, so it cannot be drawn.`);
  }
  const values = found.value.map((value: unknown) =>
    typeof value === 'number' || typeof value === 'string' ? value : null,
  );
  const last = steps.findLast((step) => typeof step === 'string');
  return { values, unit: unitAt(input.kind, result, steps), label: last ?? text };
}
