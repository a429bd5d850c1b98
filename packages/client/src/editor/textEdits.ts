import { origins } from '@stillroom/shared/document';
import { alignColumns, applyChanges, type TextChange } from '@stillroom/shared/notation';
import type * as Y from 'yjs';

/** A change without what it puts back as it was, so that what co-authors type beside it stays. */
export function narrowed(text: string, { from, to, insert }: TextChange): TextChange {
  let start = 0;
  const most = Math.min(to - from, insert.length);
  while (start < most && text[from + start] === insert[start]) start += 1;
  let end = 0;
  while (end < most - start && text[to - 1 - end] === insert[insert.length - 1 - end]) end += 1;
  return { from: from + start, to: to - end, insert: insert.slice(start, insert.length - end) };
}

/** Makes changes of a live text; the offsets of each are of the text before any of them. */
function put(live: Y.Text, changes: readonly TextChange[]): void {
  for (const { from, to, insert } of [...changes].sort((a, b) => b.from - a.from)) {
    if (to > from) live.delete(from, to - from);
    if (insert !== '') live.insert(from, insert);
  }
}

/**
 * Makes a change of a network's live text and aligns the block it is in, as one change of the author's that one undo
 * takes back.
 */
export function editNetwork(live: Y.Text, change: TextChange): void {
  const text = live.toString();
  const narrow = narrowed(text, change);
  if (narrow.from === narrow.to && narrow.insert === '') return;
  const next = applyChanges(text, [narrow]);
  const aligned = alignColumns(next, Math.min(narrow.from, next.length));
  live.doc?.transact(() => {
    put(live, [narrow]);
    put(live, aligned);
  }, origins.author);
}
