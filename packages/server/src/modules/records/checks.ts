import type { FreezeCheck, FreezeView } from '@stillroom/shared/contracts';
import type { ClaimResult } from '@stillroom/shared/cells';
import type { StandingCell } from '../compute/index.ts';

/** A remark that nobody has settled. */
export interface OpenRemark {
  readonly cell: string;
  readonly text: string;
}

type Named = FreezeCheck['cells'][number];

const named = ({ content }: StandingCell, why: string): Named => ({
  id: content.id,
  name: content.name || 'prose',
  why,
});

/** Ids of the cells that are being computed, or will be as soon as those are. */
function workingIds(cells: readonly StandingCell[]): ReadonlySet<string> {
  const working = new Set(cells.filter((cell) => cell.working).map(({ content }) => content.id));
  for (let before = -1; before < working.size;) {
    before = working.size;
    for (const { content, waitsFor } of cells)
      if (content.held === null && waitsFor.some((id) => working.has(id))) working.add(content.id);
  }
  return working;
}

/** Whether its present result is there; a held cell counts where it is held at that. */
const isCurrent = ({ known }: StandingCell): boolean => known?.status === 'ok' && known.kept;

function whyNotCurrent({ notice, content, known }: StandingCell): string {
  if (notice.error !== undefined) return notice.error.message;
  if (known?.status === 'ok') return 'It stands on a cell that failed.';
  if (content.held !== null) return 'It is held at an older result.';
  return notice.words ?? 'It has changed since it was last computed.';
}

function verdictOf(cell: StandingCell): string | null {
  if (cell.content.kind !== 'claim' || cell.known?.status !== 'ok' || cell.known.json === null) return null;
  return (JSON.parse(cell.known.json) as ClaimResult).verdict;
}

const check = (
  id: string,
  words: string,
  failing: FreezeCheck['state'],
  cells: readonly Named[],
): FreezeCheck => ({ id, words, state: cells.length === 0 ? 'met' : failing, cells });

/** The check before freezing: what stands in the way, and what may stay open for a reason. */
export function freezeChecks(cells: readonly StandingCell[], remarks: readonly OpenRemark[]): FreezeCheck[] {
  const working = workingIds(cells);
  const broken = cells.filter((cell) => !working.has(cell.content.id) && !isCurrent(cell));
  const failed = broken.filter(({ notice }) => notice.state === 'failed');
  const stale = broken.filter(({ notice }) => notice.state !== 'failed');
  const claims = cells.flatMap((cell) => {
    const verdict = verdictOf(cell);
    return verdict === null || verdict === 'holds' ? [] : [named(cell, verdict)];
  });
  const remarked = cells.flatMap((cell) =>
    remarks.filter((remark) => remark.cell === cell.content.id).map(({ text }) => named(cell, text)),
  );
  const empty = cells.length === 0 ? [{ id: '', name: '', why: 'There is no cell in it.' }] : [];
  return [
    check('content', 'The notebook holds something', 'blocking', empty),
    check(
      'failed',
      'No cell has failed',
      'blocking',
      failed.map((cell) => named(cell, whyNotCurrent(cell))),
    ),
    check(
      'stale',
      'Every cell is up to date',
      'blocking',
      stale.map((cell) => named(cell, whyNotCurrent(cell))),
    ),
    check('claims', 'Every claim holds', 'open', claims),
    check('remarks', 'Every remark is settled', 'open', remarked),
  ];
}

/** The check with what is still to be waited for. */
export function freezeView(
  cells: readonly StandingCell[],
  remarks: readonly OpenRemark[],
  nextNumber: number,
): FreezeView {
  return { checks: freezeChecks(cells, remarks), working: workingIds(cells).size, nextNumber };
}
