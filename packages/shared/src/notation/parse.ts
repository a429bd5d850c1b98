import { parseExpression, unexpected } from '../expression/parse.ts';
import type {
  AssignmentSyntax,
  AssignmentsSyntax,
  AssignmentWord,
  EventSyntax,
  LineSyntax,
  NetworkTree,
  PlacedSyntax,
  PlaceSyntax,
} from './ast.ts';
import type { Complaint } from './complaint.ts';
import { Complaints } from './complaints.ts';
import { Failure } from './failure.ts';
import { logicalLines, plainText } from './lines.ts';
import type { LogicalLine } from './lines.ts';
import { parseFor, parseTarget } from './parse-names.ts';
import { parseRow, skipToComma } from './parse-row.ts';
import { Scanner } from './tokens.ts';
import { isStatementWord } from './words.ts';

/**
 * Reads a network text into its syntax tree. Never throws: a line with an error becomes a broken line, the others are
 * read. Complaints are in order of position.
 */
export function parseNetwork(text: string): { tree: NetworkTree; complaints: readonly Complaint[] } {
  const complaints = new Complaints(text);
  const tree = parseTree(text, complaints);
  return { tree, complaints: complaints.list() };
}

/** As parseNetwork, into complaints that go on to be gathered. */
export function parseTree(text: string, complaints: Complaints): NetworkTree {
  const scanner = new Scanner(text, 0, 0, 'expression');
  return { lines: logicalLines(text).map((line) => parseLine(scanner, line, complaints)) };
}

/** One logical line of the scanner's text; what is wrong with it goes to the complaints. */
export function parseLine(scanner: Scanner, line: LogicalLine, complaints: Complaints): LineSyntax {
  const { from: begin, to, line: number, comment } = line;
  if (begin === to) return { kind: 'blank', line: number, comment, from: begin, to };
  scanner.turnTo(begin, to, 'expression');
  if (scanner.kind === 'end') return { kind: 'blank', line: number, comment, from: begin, to };
  const from = scanner.from;
  const read =
    scanner.kind === 'name' && isStatementWord(scanner.word)
      ? parseStatement(scanner, line, complaints)
      : parseRow(scanner, line, complaints);
  return (
    read ?? { kind: 'broken', source: plainText(scanner.text, begin, to), line: number, comment, from, to }
  );
}

function parseStatement(scanner: Scanner, line: LogicalLine, complaints: Complaints): LineSyntax | null {
  const from = scanner.from;
  const word = scanner.word;
  const base = { line: line.line, comment: line.comment, from, to: line.to };
  try {
    scanner.advance();
    if (word === 'in') return parsePlace(scanner, base);
    if (word === 'event') return parseEvent(scanner, base);
  } catch (thrown) {
    complaints.failure(thrown);
    return null;
  }
  const kind = word as AssignmentWord;
  const items = parseAssignments(scanner, kind, complaints);
  return items ? ({ kind, items, ...base } satisfies AssignmentsSyntax) : null;
}

/** The items of a statement, each read for itself; null where one has an error. */
function parseAssignments(
  scanner: Scanner,
  kind: AssignmentWord,
  complaints: Complaints,
): readonly AssignmentSyntax[] | null {
  const items: AssignmentSyntax[] = [];
  let sound = true;
  do {
    try {
      items.push(parseAssignment(scanner, kind));
      if (scanner.kind !== 'end' && !scanner.is(','))
        throw unexpected(scanner, 'a comma or the end of the line');
    } catch (thrown) {
      complaints.failure(thrown);
      sound = false;
      skipToComma(scanner);
    }
  } while (scanner.take(','));
  return sound ? items : null;
}

const targetKinds: Readonly<Record<AssignmentWord | 'event', string>> = {
  start: 'a species',
  let: 'a name',
  fix: 'a species',
  volume: 'a name for the volume',
  weight: 'a species',
  rate: 'a species',
  event: 'a species or constant',
};

function parseAssignment(scanner: Scanner, kind: AssignmentWord | 'event'): AssignmentSyntax {
  const from = scanner.from;
  const target = parseTarget(scanner, targetKinds[kind]);
  if (!scanner.take('=')) throw unexpected(scanner, `= after ${target.name}`);
  const value = parseExpression(scanner);
  if (kind === 'weight' && scanner.isName('in')) parseInCount(scanner);
  const family = parseFor(scanner);
  return { target, value, family, from, to: scanner.previousEnd };
}

function parseInCount(scanner: Scanner): void {
  scanner.advance();
  if (!scanner.isName('n')) {
    throw new Failure(scanner.from, scanner.to, 'A weight is an expression in n, the count of its species.');
  }
  scanner.advance();
}

function parsePlace(
  scanner: Scanner,
  base: Omit<PlaceSyntax, 'kind' | 'compartment' | 'species'>,
): PlaceSyntax {
  const compartment = parseTarget(scanner, 'a volume');
  if (!scanner.take(':')) throw unexpected(scanner, `: after ${compartment.name}`);
  const species: PlacedSyntax[] = [];
  do {
    const from = scanner.from;
    const target = parseTarget(scanner, 'a species');
    species.push({ target, family: parseFor(scanner), from, to: scanner.previousEnd });
  } while (scanner.take(','));
  if (scanner.kind !== 'end') throw unexpected(scanner, 'a comma or the end of the line');
  return { kind: 'in', compartment, species, ...base };
}

function parseEvent(scanner: Scanner, base: Omit<EventSyntax, 'kind' | 'when' | 'set'>): EventSyntax {
  if (!scanner.isName('when')) throw unexpected(scanner, 'when after event');
  scanner.advance();
  const when = parseExpression(scanner);
  if (!scanner.take(':')) throw unexpected(scanner, ': and what is set');
  const set: AssignmentSyntax[] = [];
  do set.push(parseAssignment(scanner, 'event'));
  while (scanner.take(','));
  if (scanner.kind !== 'end') throw unexpected(scanner, 'a comma or the end of the line');
  return { kind: 'event', when, set, ...base };
}
