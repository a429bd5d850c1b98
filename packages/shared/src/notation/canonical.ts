import type { LineSyntax } from './ast.ts';
import { Complaints } from './complaints.ts';
import { logicalLines } from './lines.ts';
import { parseLine } from './parse.ts';
import { joinColumns, printStatement, rowColumns } from './print.ts';
import { Scanner } from './tokens.ts';

/** Letters read anew after which a reading may pause: some milliseconds of work. */
const STRETCH = 20_000;

/**
 * The canonical text of one network as it is written on: what a line says depends on nothing but the line, so that of a
 * new version only the lines that changed are read. It changes no text, only its cost.
 */
export class CanonicalLines {
  /** The canonical print of each line of the last version, "" for a blank one, null for one with an error. */
  private known: ReadonlyMap<string, string | null> = new Map();
  private last: { readonly text: string; readonly canonical: string | null } | null = null;

  /** The canonical text of a version, as `canonicalText`; stops now and then, for what else there is to do. */
  *read(text: string): Generator<void, string | null, void> {
    if (this.last?.text === text) return this.last.canonical;
    const known = new Map<string, string | null>();
    const scanner = new Scanner(text, 0, 0, 'expression');
    const lines: string[] = [];
    let sound = true;
    let fresh = 0;
    for (const line of logicalLines(text)) {
      if (line.from === line.to) continue;
      const source = text.slice(line.from, line.to);
      let printed = known.get(source) ?? this.known.get(source);
      if (printed === undefined) {
        const complaints = new Complaints('');
        const tree = parseLine(scanner, line, complaints);
        printed = complaints.hasErrors ? null : canonicalLine(tree);
        fresh += source.length;
      }
      known.set(source, printed);
      if (printed === null) sound = false;
      else if (printed !== '') lines.push(printed);
      if (fresh > STRETCH) {
        fresh = 0;
        yield;
      }
    }
    this.known = known;
    lines.push('');
    this.last = { text, canonical: sound ? lines.join('\n') : null };
    return this.last.canonical;
  }
}

/**
 * The canonical text without comments, notes, blank lines and alignment, from which digests are made; null where the
 * text has a syntax error. `lines`: what earlier versions of the text have left to be used again.
 */
export function canonicalText(text: string, lines = new CanonicalLines()): string | null {
  const reading = lines.read(text);
  for (;;) {
    const { done, value } = reading.next();
    if (done === true) return value;
  }
}

function canonicalLine(line: LineSyntax): string {
  if (line.kind === 'blank') return '';
  return line.kind === 'row' ? joinColumns(rowColumns({ ...line, note: '' }), []) : printStatement(line);
}
