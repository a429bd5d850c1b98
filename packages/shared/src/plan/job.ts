import type { CellInput, CellJob } from '../cells/cell.ts';
import type { CellError } from '../protocol/messages.ts';
import type { Plan, PlannedCell } from './plan.ts';

/** What is known of a computed cell: its result, or why it failed. */
export type KnownOutcome =
  | { readonly status: 'ok'; readonly result: unknown }
  | { readonly status: 'failed'; readonly error: CellError };

/** Whether a cell can be computed now: yes with this job, not before these cells, or not at all. */
export type Preparation =
  | { readonly state: 'ready'; readonly job: CellJob }
  | { readonly state: 'waiting'; readonly on: readonly string[] }
  | { readonly state: 'blocked'; readonly error: CellError };

const writtenOf = ({ written }: PlannedCell) => (written === undefined ? {} : { written });

function inputFor(cell: PlannedCell, outcome: KnownOutcome | undefined): CellInput {
  const { kind, digest, text } = cell;
  const base = { kind, digest, text, ...writtenOf(cell) };
  if (cell.problem !== null) return { ...base, failed: { message: 'It cannot be computed.' } };
  if (outcome === undefined) return base;
  return outcome.status === 'ok' ? { ...base, result: outcome.result } : { ...base, failed: outcome.error };
}

/**
 * Makes the job of one cell of a plan. Cells whose source is enough are not waited for; a failed cell blocks whatever
 * reads its result, except a claim, which is then undecided.
 *
 * @param outcomeOf what is known of a cell under its present digest; undefined where it has not been computed
 */
export function prepareJob(
  plan: Plan,
  id: string,
  outcomeOf: (id: string) => KnownOutcome | undefined,
): Preparation {
  const cell = plan.byId.get(id);
  if (cell === undefined) return { state: 'blocked', error: { message: 'This cell is gone.' } };
  if (cell.problem !== null || cell.digest === null) {
    return { state: 'blocked', error: cell.problem ?? { message: 'This cell cannot be computed.' } };
  }
  const inputs: Record<string, CellInput> = {};
  const waiting: string[] = [];
  for (const { name, id: drawn, reads } of cell.inputs) {
    const source = plan.byId.get(drawn);
    if (source === undefined) continue;
    const outcome = reads === 'result' && source.problem === null ? outcomeOf(drawn) : undefined;
    if (reads === 'result' && source.problem === null && outcome === undefined) waiting.push(drawn);
    if (outcome?.status === 'failed' && cell.kind !== 'claim') {
      return {
        state: 'blocked',
        error: { message: `It draws on ${name}, which failed.`, hint: outcome.error.message },
      };
    }
    inputs[name] = inputFor(source, outcome);
  }
  if (waiting.length > 0) return { state: 'waiting', on: waiting };
  const { digest, kind, text, settings } = cell;
  return { state: 'ready', job: { digest, kind, text, ...writtenOf(cell), settings, inputs } };
}
