import type { CellOutcome } from '@stillroom/shared/cells';
import {
  engineVersion,
  type KnownOutcome,
  type Plan,
  type PlannableCell,
  planNotebook,
  prepareJob,
} from '@stillroom/shared/plan';
import { isCellKind } from '@stillroom/shared/cells';
import { limits } from '@stillroom/shared/protocol';
import type { EntityManager } from 'typeorm';
import type { Pool } from '../../compute/index.ts';
import { readRecordContent, RecordEntity, type RecordCell } from '../../records/index.ts';
import { RerunCellEntity, RerunEntity } from '../entities/rerun.ts';
import { ReviewEntity } from '../entities/review.ts';

/** How one cell of a rerun came out. */
export type Comparison = Pick<RerunCellEntity, 'outcome' | 'why' | 'result'>;

export interface Rerunning {
  readonly pool: Pool;
  readonly cells: readonly RecordCell[];
  /** Version of the engine that made the record. */
  readonly engine: string;
  /** Ids of the cells to be compared. */
  readonly asked: ReadonlySet<string>;
  /** The group whose turn it is. */
  readonly owner: string;
  /** What of the group's it is for: the rerun. */
  readonly part: string;
  /** Ends it between two cells, and the cell under way. */
  readonly signal: AbortSignal;
  /** Told of each cell asked for when it begins and when it is done. */
  readonly tell: (cell: string, comparison: Comparison) => Promise<void>;
}

/**
 * Computes the cells of a record anew, each from fresh results of the cells it draws on; nothing kept is read. Only
 * what is asked for is compared. Cells keep the digests that they have in the record, so that scripts get the same random
 * numbers and prose names the same results, whichever engine computes.
 */
export async function rerunRecord(rerunning: Rerunning): Promise<void> {
  const { cells, engine, asked, signal, tell } = rerunning;
  const plan = asRecorded(planNotebook(cells.flatMap(asPlannable)), cells);
  const needed = withInputs(plan, asked);
  const outcomes = new Map<string, KnownOutcome>();
  const ended = (): boolean => signal.aborted;
  for (const id of plan.order) {
    if (!needed.has(id)) continue;
    if (ended()) return;
    if (asked.has(id)) await tell(id, { outcome: 'working', why: null, result: null });
    const outcome = await runFresh(rerunning, plan, id, outcomes);
    if (ended()) return;
    outcomes.set(id, outcome);
    const frozen = cells.find((cell) => cell.id === id);
    if (asked.has(id) && frozen !== undefined) await tell(id, compare(outcome, frozen, engine));
  }
}

async function runFresh(
  { pool, owner, part, signal }: Rerunning,
  plan: Plan,
  id: string,
  outcomes: ReadonlyMap<string, KnownOutcome>,
): Promise<CellOutcome> {
  const preparation = prepareJob(plan, id, (input) => outcomes.get(input));
  if (preparation.state === 'ready')
    // A signal of its own for each run: listeners on the long-lived one would gather.
    return pool.run(preparation.job, {
      deadline: limits.deadlineUsual,
      owner,
      part,
      signal: AbortSignal.any([signal]),
    });
  const error =
    preparation.state === 'blocked'
      ? preparation.error
      : { message: 'A cell it draws on has not been computed.' };
  return { status: 'failed', error, warnings: [], keep: false };
}

/** "matches" means equal result digests: bit for bit the same. Where not, it is said which engine made which. */
export function compare(outcome: CellOutcome, frozen: RecordCell, engine: string): Comparison {
  const engines =
    engine === engineVersion
      ? ''
      : ` The record was made by engine ${engine}, this rerun by engine ${engineVersion}.`;
  if (outcome.status === 'failed')
    return { outcome: 'failed', why: outcome.error.message + engines, result: null };
  if (outcome.resultDigest === frozen.resultDigest) return { outcome: 'matches', why: null, result: null };
  return {
    outcome: 'differs',
    why: `The fresh result is not the one in the record.${engines}`,
    result: JSON.stringify(outcome.result),
  };
}

/** The plan with the digests of the record in place of those that this engine would give. */
function asRecorded(plan: Plan, cells: readonly RecordCell[]): Plan {
  const recorded = new Map(cells.map(({ id, digest }) => [id, digest]));
  const named = plan.cells.map((cell) => ({
    ...cell,
    digest: cell.digest === null ? null : (recorded.get(cell.id) ?? cell.digest),
  }));
  return { ...plan, cells: named, byId: new Map(named.map((cell) => [cell.id, cell])) };
}

/** The cells asked for and all whose results they stand on. */
function withInputs(plan: Plan, asked: ReadonlySet<string>): ReadonlySet<string> {
  const needed = new Set(asked);
  for (const id of needed)
    for (const input of plan.byId.get(id)?.inputs ?? []) if (input.reads === 'result') needed.add(input.id);
  return needed;
}

function asPlannable({ id, kind, name, text, settings }: RecordCell): PlannableCell[] {
  return isCellKind(kind) ? [{ id, kind, name, text, settings }] : [];
}

/** Where a rerun runs: the pool of this process, and the process by the name of its connections. */
export interface RerunPlace {
  readonly pool: Pool;
  readonly host: string;
  readonly signal: AbortSignal;
}

/** The task: runs a rerun that was queued, and closes it whatever happens. */
export async function runRerun(
  manager: EntityManager,
  { pool, host, signal }: RerunPlace,
  id: string,
): Promise<void> {
  const rerun = await manager.findOneBy(RerunEntity, { id });
  if (rerun === null || rerun.doneAt !== null) return;
  await manager.update(RerunEntity, { id }, { host, engine: engineVersion });
  try {
    const review = await manager.findOneByOrFail(ReviewEntity, { id: rerun.review });
    const record = await manager.findOneByOrFail(RecordEntity, { id: review.record });
    const { cells, engine = engineVersion } = await readRecordContent(manager, record.id);
    const asked = cells.filter((cell) => rerun.cell === null || rerun.cell === cell.id);
    await rerunRecord({
      pool,
      cells,
      engine,
      asked: new Set(asked.map((cell) => cell.id)),
      owner: record.group,
      part: id,
      signal,
      async tell(cell, comparison) {
        await manager.update(RerunCellEntity, { rerun: id, cell }, comparison);
      },
    });
  } finally {
    await closeRerun(manager, id);
  }
}

/** Closes a rerun; cells that were not reached have failed for a reason that is none of theirs. */
export async function closeRerun(manager: EntityManager, id: string): Promise<void> {
  await manager
    .createQueryBuilder()
    .update(RerunCellEntity)
    .set({ outcome: 'failed', why: 'The rerun was broken off before this cell; run it again.' })
    .where(`rerun = :id and outcome in ('waiting', 'working')`, { id })
    .execute();
  await manager.update(RerunEntity, { id }, { doneAt: new Date() });
}

/** Closes the reruns of processes that are no more. */
export async function closeOrphans(manager: EntityManager): Promise<void> {
  const orphans: { id: string }[] = await manager.query(
    `select id from rerun where done_at is null and host is not null
       and host not in (select application_name from pg_stat_activity where application_name is not null)`,
  );
  for (const { id } of orphans) await closeRerun(manager, id);
}
