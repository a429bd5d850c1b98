const arrow = /<=>|->|<-|[→←⇌]/u;
const statement = /^\s*(?:start|let|fix|volume|in|weight|event|rate)\b/u;

/** The part of a line before its comment. */
export const withoutComment = (line: string): string => {
  const at = line.indexOf('#');
  return at < 0 ? line : line.slice(0, at);
};

/** Whether a line of a network writes reactions. */
export function isRow(line: string): boolean {
  const code = withoutComment(line);
  return !statement.test(code) && arrow.test(code.split('|')[0] ?? '');
}

/** Number of the row that each line of a text writes, 1-based; 0 where it writes none. */
export function rowNumbers(lines: Iterable<string>): readonly number[] {
  const numbers: number[] = [];
  let count = 0;
  let goesOn = false;
  for (const line of lines) {
    numbers.push(!goesOn && isRow(line) ? ++count : 0);
    goesOn = line.endsWith('\\');
  }
  return numbers;
}

/** Where the first two bars of a line stand, outside its comment. */
export function barsOf(line: string): readonly number[] {
  const code = withoutComment(line);
  const first = code.indexOf('|');
  if (first < 0) return [];
  const second = code.indexOf('|', first + 1);
  return second < 0 ? [first] : [first, second];
}

/** The notes of a network's rows, in order: what stands after the second bar. */
export function rowNotes(text: string): readonly string[] {
  const lines = text.replaceAll(/\\\n/gu, ' ').split('\n');
  return lines.filter(isRow).map((line) => withoutComment(line).split('|')[2]?.trim() ?? '');
}
