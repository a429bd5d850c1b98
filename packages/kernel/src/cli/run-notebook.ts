import type { CellOutcome } from '@stillroom/shared/cells';
import {
  type CellResult,
  failureOf,
  type NotebookFile,
  resultOf,
  type ResultsFile,
  resultsFormat,
} from '@stillroom/shared/notebook-file';
import {
  engineVersion,
  type KnownOutcome,
  type Plan,
  planNotebook,
  prepareJob,
} from '@stillroom/shared/plan';
import type { CellJob } from '@stillroom/shared/cells';

/** Computes a job within a deadline; never rejects. */
export type RunJob = (job: CellJob) => Promise<CellOutcome>;

/** Ids of a cell and everything it draws on, directly or not. */
function withSources(plan: Plan, id: string): Set<string> {
  const wanted = new Set<string>();
  const visit = (one: string): void => {
    if (wanted.has(one)) return;
    wanted.add(one);
    plan.byId.get(one)?.draws.forEach(visit);
  };
  visit(id);
  return wanted;
}

const known = (outcome: CellOutcome): KnownOutcome =>
  outcome.status === 'ok'
    ? { status: 'ok', result: outcome.result }
    : { status: 'failed', error: outcome.error };

/**
 * Computes the cells of a notebook, each after what it draws on, one at a time. Held cells are computed like any other.
 *
 * @param only name or id of the one cell to give; null for all
 * @returns the results, or null where `only` is no cell of the notebook
 */
export async function runNotebook(
  file: NotebookFile,
  only: string | null,
  runJob: RunJob,
): Promise<ResultsFile | null> {
  const plan = planNotebook(file.cells);
  const chosen =
    only === null
      ? null
      : (plan.cells.find(({ name, id }) => name === only.normalize('NFC') || (name === '' && id === only)) ??
        null);
  if (only !== null && chosen === null) return null;
  const wanted = chosen === null ? null : withSources(plan, chosen.id);
  const outcomes = new Map<string, KnownOutcome>();
  const results = new Map<string, CellResult>();
  for (const id of plan.order) {
    const cell = plan.byId.get(id);
    if (cell === undefined || (wanted !== null && !wanted.has(id))) continue;
    const prepared = prepareJob(plan, id, (drawn) => outcomes.get(drawn));
    if (prepared.state === 'ready') {
      const outcome = await runJob(prepared.job);
      outcomes.set(id, known(outcome));
      results.set(id, resultOf(cell.kind, cell.digest, outcome));
    } else {
      const error =
        prepared.state === 'blocked' ? prepared.error : { message: 'What it draws on has no result.' };
      outcomes.set(id, { status: 'failed', error });
      results.set(id, failureOf(cell.kind, cell.digest, error));
    }
  }
  const given = plan.cells.filter(({ id }) => results.has(id) && (chosen === null || id === chosen.id));
  return {
    format: resultsFormat,
    engine: engineVersion,
    cells: Object.fromEntries(
      given.map(({ id, name, kind }) => [
        name === '' ? id : name,
        results.get(id) ?? failureOf(kind, null, { message: 'It was not computed.' }),
      ]),
    ),
  };
}
