import { parseExpression, parseIndices, parseRange, singleEquals, unexpected } from '../expression/parse.ts';
import type { NameSyntax, RangeSyntax } from '../expression/syntax.ts';
import type { FamilySyntax, TargetSyntax } from './ast.ts';
import { Failure } from './failure.ts';
import type { Scanner } from './tokens.ts';
import { reservedReason } from './words.ts';

/** A name that may be reserved, with its indices. In a row the mode is put back before the word after `]`. */
export function parseTarget(scanner: Scanner, expected: string): TargetSyntax {
  if (scanner.kind !== 'name') throw unexpected(scanner, expected);
  const { from, to, word: name, mode } = scanner;
  const reason = reservedReason(name);
  if (reason !== null) {
    throw new Failure(from, to, `${reason} and cannot be used as a name.`, { hint: 'Choose another name.' });
  }
  scanner.advance();
  if (!scanner.is('[')) return { name, indices: null, from, to };
  scanner.mode = 'expression';
  const indices = parseIndices(scanner);
  scanner.mode = mode;
  scanner.advance();
  return { name, indices, from, to: scanner.previousEnd };
}

/** A target as a name in an expression. */
export function nameOfTarget(target: TargetSyntax): NameSyntax {
  return { kind: 'name', ...target };
}

/** `for i = 1..L, j = 1..M where c`, or null where no `for` follows. A comma not followed by a range ends it. */
export function parseFor(scanner: Scanner): FamilySyntax | null {
  const from = scanner.from;
  if (!scanner.isName('for')) return null;
  scanner.advance();
  const ranges: RangeSyntax[] = [parseRange(scanner)];
  while (scanner.is(',') && rangeFollowsComma(scanner)) {
    scanner.advance();
    ranges.push(parseRange(scanner));
  }
  return finishFamily(scanner, ranges, from);
}

/** `[i = 1..L where c]` at the beginning of a row, or null where no bracket stands there. Leaves the mode at "row". */
export function parseFamily(scanner: Scanner): FamilySyntax | null {
  const from = scanner.from;
  if (!scanner.is('[')) return null;
  scanner.mode = 'expression';
  scanner.advance();
  const ranges: RangeSyntax[] = [];
  do ranges.push(parseRange(scanner));
  while (scanner.take(','));
  const family = finishFamily(scanner, ranges, from);
  if (!scanner.is(']'))
    throw scanner.is('=') ? singleEquals(scanner) : unexpected(scanner, '], where or another index');
  scanner.mode = 'row';
  scanner.advance();
  return family;
}

function finishFamily(scanner: Scanner, ranges: readonly RangeSyntax[], from: number): FamilySyntax {
  let where = null;
  if (scanner.isName('where')) {
    scanner.advance();
    where = parseExpression(scanner, { units: false });
    if (scanner.is('=')) throw singleEquals(scanner);
  }
  const names = new Set<string>();
  for (const range of ranges) {
    if (names.has(range.name))
      throw new Failure(range.from, range.to, `The index ${range.name} is given twice.`);
    names.add(range.name);
  }
  return { ranges, where, from, to: scanner.previousEnd };
}

/** After `for …` a comma may go on with another index (`j = 1..M`) or with the next item (`B = 2`): `..` tells. */
function rangeFollowsComma(scanner: Scanner): boolean {
  const start = scanner.mark();
  const before = scanner.previousEnd;
  scanner.advance();
  let found = false;
  for (let depth = 0; scanner.kind !== 'end'; scanner.advance()) {
    if (scanner.is('(') || scanner.is('[')) depth += 1;
    else if (scanner.is(')') || scanner.is(']')) depth -= 1;
    else if (depth <= 0 && (scanner.is(',') || scanner.isName('for'))) break;
    else if (depth <= 0 && scanner.is('..')) {
      found = true;
      break;
    }
  }
  scanner.reset(start, before);
  return found;
}
