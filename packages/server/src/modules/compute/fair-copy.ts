import type { FairCell, FairCopy } from '@stillroom/shared/contracts';
import type { EntityManager } from 'typeorm';
import { readAuthors } from '../notebooks/index.ts';
import type { Planner } from './planner.ts';
import type { Known, ResultStore } from './results.ts';

/** A fair copy as JSON text: results are set in as they are kept, without being read and written anew. */
export async function fairCopyText(
  manager: EntityManager,
  results: ResultStore,
  planner: Planner,
  notebook: { readonly id: string; readonly groupName: string; readonly at: Date },
): Promise<string> {
  const { content, cells } = await planner.standing();
  const texts = await Promise.all(
    cells.map(async ({ content: cell, notice, known }) => {
      const shown = notice.shown === null ? null : await shownResult(results, notice.shown, known);
      const fair: Omit<FairCell, 'result'> = {
        id: cell.id,
        kind: cell.kind,
        name: cell.name,
        text: cell.text,
        settings: cell.settings,
        state: notice.state,
        digest: notice.digest,
        resultDigest: shown?.resultDigest ?? null,
        error: notice.error ?? null,
        warnings: notice.warnings ?? [],
      };
      return withResult(fair, shown?.text ?? null);
    }),
  );
  const head: Omit<FairCopy, 'cells'> = {
    title: content.title,
    subject: content.subject,
    group: notebook.groupName,
    authors: await readAuthors(manager, notebook.id),
    at: notebook.at.toISOString(),
  };
  return `${JSON.stringify(head).slice(0, -1)},"cells":[${texts.join(',')}]}`;
}

/** The text of an object with `result` set in. */
export const withResult = (value: object, text: string | null): string =>
  `${JSON.stringify(value).slice(0, -1)},"result":${text ?? 'null'}}`;

/** The last good result of a cell. */
async function shownResult(
  results: ResultStore,
  digest: string,
  known: Known | undefined,
): Promise<{ text: string; resultDigest: string } | null> {
  const shown = known?.digest === digest ? known : (await results.find([digest])).get(digest);
  if (shown?.status !== 'ok') return null;
  const text = shown.json ?? (await results.text(digest));
  return text === null ? null : { text, resultDigest: shown.resultDigest };
}
