import type { CellContent } from '@stillroom/shared/document';
import type { Plan, PlannedCell, Preparation } from '@stillroom/shared/plan';
import type { CellNotice, CellState } from '@stillroom/shared/protocol';
import type { Known } from './results.ts';

/** A run that was asked for: queued, and from `since` on under way. */
export interface Run {
  readonly since: string | null;
  readonly share: number | null;
  readonly words: string | null;
}

/** A cell as it stands, for fair copies and records. */
export interface StandingCell {
  readonly content: CellContent;
  readonly planned: PlannedCell;
  readonly notice: CellNotice;
  readonly known: Known | undefined;
  /** Whether it is queued or being computed. */
  readonly working: boolean;
  /** Ids of the cells that must be computed before it can be. */
  readonly waitsFor: readonly string[];
}

/** Everything that decides what is said of a cell. */
export interface CellFacts {
  readonly content: CellContent;
  readonly planned: PlannedCell;
  /** What is known under its present digest. */
  readonly known: Known | undefined;
  readonly run: Run | undefined;
  /** Whether it could be computed now; asked only where nothing is known and nothing runs. */
  readonly preparation: Preparation | undefined;
  /** Digest of its last good result. */
  readonly shown: string | null;
}

type Said = Pick<CellNotice, 'state'> & Partial<CellNotice>;

/** Why a cell that is neither known nor running is not computed. */
function sayUnknown({ preparation, content }: CellFacts, plan: Plan): Said {
  if (content.held !== null) return { state: 'held' };
  if (preparation?.state === 'blocked') return { state: 'failed', error: preparation.error };
  if (preparation?.state !== 'waiting') return { state: 'stale' };
  const names = preparation.on.map((id) => plan.byId.get(id)?.name || 'a cell above');
  return { state: 'stale', words: `waits for ${names.join(' and ')}` };
}

function sayRun({ since, share, words }: Run): Said {
  if (since === null) return { state: 'working', words: 'waits for its turn' };
  return {
    state: 'working',
    since,
    ...(share === null ? {} : { progress: share }),
    ...(words === null ? {} : { words }),
  };
}

function sayKnown(known: Known, held: boolean): Said {
  const warnings = known.warnings.length > 0 ? { warnings: known.warnings } : {};
  if (known.status === 'failed') return { state: 'failed', error: known.error, ...warnings };
  return { state: held ? 'held' : 'current', took: Math.round(known.took * 10) / 10, ...warnings };
}

function say(facts: CellFacts, plan: Plan): Said {
  const { planned, known, run, content } = facts;
  if (planned.problem !== null) return { state: 'failed', error: planned.problem };
  if (known !== undefined) return sayKnown(known, content.held !== null);
  if (run !== undefined) return sayRun(run);
  return sayUnknown(facts, plan);
}

/** Prose has no seam: it is set or it cannot be set, and the last setting stands meanwhile. */
const stateOf = (kind: string, state: CellState): CellState =>
  kind === 'prose' && state !== 'failed' ? 'current' : state;

/** What is said of a cell, without its result. */
export function noticeOf(facts: CellFacts, plan: Plan): CellNotice {
  const { planned, content, shown } = facts;
  const said = say(facts, plan);
  return {
    ...(content.held === null ? {} : { heldBy: content.held.by, since: content.held.at }),
    ...said,
    id: planned.id,
    state: stateOf(planned.kind, said.state),
    digest: planned.digest,
    shown,
    draws: planned.draws,
  };
}
