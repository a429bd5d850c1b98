import { highlightLine, tableOf } from '@stillroom/shared/notation';

/** Lines are read again and again while one types; so many are remembered. */
const remembered = 10_000;
const known = new Map<string, boolean>();

/** Whether a line of a network writes a row, sound or not; statements, comments and blank lines write none. */
export function isRow(line: string): boolean {
  const before = known.get(line);
  if (before !== undefined) return before;
  if (known.size >= remembered) known.clear();
  const first = highlightLine(line)[0]?.style;
  const found = first !== undefined && first !== 'keyword' && first !== 'comment';
  known.set(line, found);
  return found;
}

/** Whether a line ends in `\` and so goes on in the next; in a comment it does not. */
export const goesOn = (line: string): boolean => /\\\s*$/u.test(line) && !line.includes('#');

/** Number of the row that each line of a text writes, 1-based; 0 where it writes none. */
export function rowNumbers(lines: Iterable<string>): readonly number[] {
  const numbers: number[] = [];
  let count = 0;
  let joined = false;
  for (const line of lines) {
    numbers.push(!joined && isRow(line) ? ++count : 0);
    joined = goesOn(line);
  }
  return numbers;
}

/** The note of each line that was read; null where it writes no row. */
const knownNotes = new Map<string, string | null>();

function noteOf(line: string): string | null {
  const before = knownNotes.get(line);
  if (before !== undefined) return before;
  if (knownNotes.size >= remembered) knownNotes.clear();
  const found = tableOf(line)[0]?.note ?? null;
  knownNotes.set(line, found);
  return found;
}

/** The notes of a network's rows, in order: what stands after the second bar. Lines that were read before are not read anew. */
export function rowNotes(text: string): readonly string[] {
  if (text.includes('\\') || text.includes('\r')) return tableOf(text).map(({ note }) => note);
  return text.split('\n').flatMap((line) => noteOf(line) ?? []);
}
