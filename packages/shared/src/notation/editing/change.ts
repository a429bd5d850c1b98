/** A change of a text: put `insert` in the place of `from`..`to`. Offsets are of the text before any change. */
export interface TextChange {
  readonly from: number;
  readonly to: number;
  readonly insert: string;
}

/** The text after changes that do not overlap. */
export function applyChanges(text: string, changes: readonly TextChange[]): string {
  let result = '';
  let at = 0;
  for (const { from, to, insert } of [...changes].sort((a, b) => a.from - b.from)) {
    result += text.slice(at, from) + insert;
    at = to;
  }
  return result + text.slice(at);
}
