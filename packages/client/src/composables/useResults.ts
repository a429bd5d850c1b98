import type { PlanNotice } from '@stillroom/shared/protocol';
import { shallowReactive } from 'vue';
import { RequestError, wordsOf } from '../api/client.ts';
import { fetchResult } from '../api/notebooks.ts';

/** A kept result as the page holds it. Results never change under their digest. */
export type Kept =
  | { readonly state: 'here'; readonly result: unknown; readonly warnings: readonly string[] }
  | { readonly state: 'asked' }
  | { readonly state: 'lost'; readonly words: string };

export interface Results {
  readonly byDigest: ReadonlyMap<string, Kept>;
  /** Takes in the results that rode along with a notice. */
  take(notice: PlanNotice): void;
  /** Fetches a result unless it is here or under way; a lost one is asked for again. */
  ask(digest: string): void;
}

/** Results of one notebook by digest: each is fetched once. */
export function useResults(notebook: string): Results {
  const byDigest = shallowReactive(new Map<string, Kept>());

  function take(notice: PlanNotice): void {
    for (const cell of notice.cells) {
      // What a failed run left is not the last good result, which `shown` names.
      const digest = cell.state === 'failed' ? null : (cell.shown ?? cell.digest);
      if (digest === null || cell.result === undefined) continue;
      byDigest.set(digest, { state: 'here', result: cell.result, warnings: cell.warnings ?? [] });
    }
  }

  function ask(digest: string): void {
    const held = byDigest.get(digest);
    if (held !== undefined && held.state !== 'lost') return;
    byDigest.set(digest, { state: 'asked' });
    fetchResult(notebook, digest).then(
      ({ result, warnings }) => byDigest.set(digest, { state: 'here', result, warnings }),
      (cause: unknown) => {
        const words =
          cause instanceof RequestError && cause.status === 404
            ? 'This result is no longer kept. Bring the cell up to date.'
            : wordsOf(cause);
        byDigest.set(digest, { state: 'lost', words });
      },
    );
  }

  return { byDigest, take, ask };
}
