/** A column is padded to at most this; a longer cell pushes its own bar only. */
export const WIDEST = 60;

/** How many letters wide a text is: marks that join the letter before take no room. */
export function widthOf(text: string): number {
  let ascii = true;
  for (let i = 0; i < text.length && ascii; i += 1) ascii = text.charCodeAt(i) < 128;
  return ascii ? text.length : [...text.replace(/\p{M}/gu, '')].length;
}

/** `text` with blanks up to a width. */
export function pad(text: string, width: number): string {
  return text + ' '.repeat(Math.max(0, width - widthOf(text)));
}

/**
 * The widths of the columns of each line: lines of one block (between blank lines) share theirs. `lines[i]` is null for
 * a line without columns; the last column of a line has no width.
 */
export function columnWidths(
  lines: readonly (readonly string[] | null)[],
  isBlank: readonly boolean[],
): readonly (readonly number[])[] {
  const result: (readonly number[])[] = [];
  let block: number[] = [];
  lines.forEach((columns, i) => {
    if (isBlank[i]) block = [];
    columns?.slice(0, -1).forEach((column, c) => {
      const width = widthOf(column);
      if (width <= WIDEST) block[c] = Math.max(block[c] ?? 0, width);
    });
    result.push(block);
  });
  return result;
}
