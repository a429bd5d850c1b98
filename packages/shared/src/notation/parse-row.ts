import { parseExpression, unexpected } from '../expression/parse.ts';
import { rational } from '../network/index.ts';
import type { ArrowSyntax, ItemSyntax, RowSyntax, SideSyntax, TermSyntax } from './ast.ts';
import { sumOfCoefficients } from './coefficients.ts';
import type { Complaints } from './complaints.ts';
import { Failure, makeIt } from './failure.ts';
import { plainText } from './lines.ts';
import type { LogicalLine } from './lines.ts';
import { nameOfTarget, parseFamily, parseTarget } from './parse-names.ts';
import type { Scanner } from './tokens.ts';

/** Reads a row column by column, so that an error in one hides none in the next; null where any has one. */
export function parseRow(scanner: Scanner, line: LogicalLine, complaints: Complaints): RowSyntax | null {
  const { text } = scanner;
  const firstBar = line.bars[0] ?? line.to;
  const secondBar = line.bars[1] ?? line.to;
  const itemsFrom = Math.min(firstBar + 1, line.to);
  let reaction: ReactionColumn | null = null;
  try {
    reaction = parseReaction(scanner.turnTo(line.from, firstBar, 'row'));
  } catch (thrown) {
    complaints.failure(thrown);
  }
  const items =
    itemsFrom < secondBar
      ? parseItems(scanner.turnTo(itemsFrom, secondBar, 'expression'), complaints)
      : noItems;
  if (!reaction || !items) return null;
  return {
    kind: 'row',
    line: line.line,
    comment: line.comment,
    family: reaction.family,
    sides: reaction.sides,
    arrows: reaction.arrows,
    from: reaction.from,
    items,
    itemsSpan: { from: itemsFrom, to: secondBar },
    note: secondBar < line.to ? plainText(text, secondBar + 1, line.to).normalize('NFC') : '',
    to: line.to,
  };
}

const noItems: readonly ItemSyntax[] = [];

type ReactionColumn = Pick<RowSyntax, 'family' | 'sides' | 'arrows' | 'from'>;

function parseReaction(scanner: Scanner): ReactionColumn {
  const from = scanner.from;
  const family = parseFamily(scanner);
  const sides = [parseSide(scanner)];
  const arrows: ArrowSyntax[] = [];
  while (scanner.kind !== 'end' || arrows.length === 0) {
    arrows.push(parseArrow(scanner, arrows.length === 0));
    sides.push(parseSide(scanner));
  }
  return { family, sides, arrows, from };
}

/** What people type between the sides, and the arrow that it is or was meant to be: the longest that fits is taken. */
const arrowSigns: readonly (readonly [typed: string, sign: ArrowSyntax['sign']])[] = [
  ['<-->', '<=>'],
  ['<==>', '<=>'],
  ['<=>', '<=>'],
  ['<->', '<=>'],
  ['-->', '->'],
  ['==>', '->'],
  ['<--', '<-'],
  ['->', '->'],
  ['<-', '<-'],
  ['=>', '->'],
  ['<=', '<=>'],
  ['→', '->'],
  ['←', '<-'],
  ['⇌', '<=>'],
  ['↔', '<=>'],
  ['⇄', '<=>'],
  ['⟶', '->'],
  ['=', '<=>'],
  ['>', '->'],
];
const properSigns = new Set(['->', '<-', '<=>', '→', '←', '⇌']);

function parseArrow(scanner: Scanner, first: boolean): ArrowSyntax {
  return properArrow(scanner) ?? parseTypedArrow(scanner, first);
}

/** An arrow as it is mostly written: a word of the notation that no longer arrow begins with. */
function properArrow(scanner: Scanner): ArrowSyntax | null {
  const { word, from, to, text } = scanner;
  if (scanner.kind !== 'symbol' || (word !== '->' && word !== '<=>' && word !== '<-')) return null;
  const next = to < scanner.limit ? text.charCodeAt(to) : 0;
  // `<->` and `<--` are longer.
  if (word === '<-' && (next === 62 || next === 45)) return null;
  scanner.advance();
  return { sign: word, from, to };
}

function parseTypedArrow(scanner: Scanner, first: boolean): ArrowSyntax {
  const { from, text, limit } = scanner;
  const fitting = arrowSigns.find(([typed]) => text.startsWith(typed, from) && from + typed.length <= limit);
  if (!fitting) throw missingArrow(scanner, first);
  const [typed, sign] = fitting;
  const to = from + typed.length;
  if (!properSigns.has(typed)) {
    throw new Failure(from, to, `${typed} is no arrow of the notation.`, {
      hint: 'Arrows are ->, <- and <=>.',
      repairs: [makeIt(sign, from, to)],
    });
  }
  scanner.advance();
  return { sign, from, to };
}

function missingArrow(scanner: Scanner, first: boolean): Failure {
  const { from, to, previousEnd } = scanner;
  if (!first || !scanner.has('end')) return unexpected(scanner, '+, an arrow or |');
  return new Failure(from, to, 'Expected an arrow: ->, <- or <=>.', {
    hint: 'A row says what turns into what: A + B -> C.',
    repairs: [{ label: 'Add -> 0', from: previousEnd, to: previousEnd, insert: ' -> 0' }],
  });
}

function parseSide(scanner: Scanner): SideSyntax {
  const from = scanner.from;
  const terms: TermSyntax[] = [];
  do {
    const term = parseTerm(scanner);
    if (term === null) {
      // The zero complex stands alone.
      if (terms.length === 0 && !scanner.is('+')) return { terms, from, to: scanner.previousEnd };
      throw new Failure(
        from,
        scanner.previousEnd,
        '0 stands alone on its side: it is the complex of nothing.',
        {
          hint: 'Leave the 0 out.',
        },
      );
    }
    terms.push(term);
  } while (scanner.take('+'));
  return { terms: gathered(terms), from, to: scanner.previousEnd };
}

/** A term, or null for a lone 0. */
function parseTerm(scanner: Scanner): TermSyntax | null {
  const from = scanner.from;
  if (scanner.kind !== 'number') {
    const species = parseTarget(scanner, 'a species or 0');
    return { numerator: 1, denominator: 1, species, from, to: species.to };
  }
  const isZero = scanner.word === '0';
  const coefficient = parseCoefficient(scanner);
  if (isZero && coefficient === null) return null;
  if (coefficient === null || !scanner.has('name')) throw unexpected(scanner, 'a species after the number');
  const species = parseTarget(scanner, 'a species after the number');
  return { ...coefficient, species, from, to: species.to };
}

/** The coefficient at the scanner in lowest terms; null for a 0 that no name follows. */
function parseCoefficient(scanner: Scanner): { numerator: number; denominator: number } | null {
  const { from, word } = scanner;
  scanner.advance();
  let value = word.length > 40 ? null : rational.ofDecimal(word);
  if (scanner.is('/')) {
    scanner.advance();
    const below =
      scanner.kind === 'number' && scanner.word.length <= 40 ? rational.ofDecimal(scanner.word) : null;
    if (!below || below.numerator === 0n || !rational.isInteger(below))
      throw unexpected(scanner, 'a whole number below /');
    if (!value || !rational.isInteger(value))
      throw new Failure(from, scanner.to, 'A fraction has whole numbers: 1/2.');
    value = rational.divide(value, below);
    scanner.advance();
  } else if (word === '0' && scanner.kind !== 'name') return null;
  const numerator = Number(value?.numerator ?? NaN);
  const denominator = Number(value?.denominator ?? NaN);
  if (numerator === 0) {
    throw new Failure(from, scanner.previousEnd, 'A coefficient cannot be 0.', {
      hint: 'Leave the species out.',
    });
  }
  if (!Number.isSafeInteger(numerator) || !Number.isSafeInteger(denominator)) {
    throw new Failure(from, scanner.previousEnd, 'This coefficient is too large.', {
      hint: 'Numerator and denominator must be below 2^53.',
    });
  }
  return { numerator, denominator };
}

/** A + A is 2 A: gathers the terms of species without indices. */
function gathered(terms: readonly TermSyntax[]): readonly TermSyntax[] {
  if (terms.length < 2) return terms;
  const places = new Map<string, number>();
  const result: TermSyntax[] = [];
  for (const term of terms) {
    const { name, indices } = term.species;
    const place = indices ? undefined : places.get(name);
    const before = place === undefined ? undefined : result[place];
    if (place === undefined || before === undefined) {
      if (!indices) places.set(name, result.length);
      result.push(term);
    } else result[place] = { ...before, ...sumOfCoefficients(before, term) };
  }
  return result;
}

/** The constants column; null where an item has an error. Each item is read for itself. */
function parseItems(scanner: Scanner, complaints: Complaints): readonly ItemSyntax[] | null {
  const items: ItemSyntax[] = [];
  let sound = true;
  if (scanner.has('end')) return items;
  for (;;) {
    try {
      items.push(parseItem(scanner));
      if (scanner.kind !== 'end' && !scanner.is(',')) throw unexpected(scanner, 'a comma or |');
    } catch (thrown) {
      complaints.failure(thrown);
      sound = false;
      skipToComma(scanner);
    }
    if (!scanner.take(',')) return sound ? items : null;
  }
}

/** Goes on to the next comma outside brackets, or to the end. */
export function skipToComma(scanner: Scanner): void {
  for (let depth = 0; scanner.kind !== 'end'; scanner.advance()) {
    if (scanner.is('(') || scanner.is('[')) depth += 1;
    else if (scanner.is(')') || scanner.is(']')) depth -= 1;
    else if (depth <= 0 && scanner.is(',')) return;
  }
}

function parseItem(scanner: Scanner): ItemSyntax {
  const from = scanner.from;
  if (scanner.isName('law') || scanner.isName('net')) {
    const kind = scanner.word === 'law' ? 'law' : 'net';
    scanner.advance();
    if (!scanner.take('=')) throw unexpected(scanner, `= after ${kind}`);
    const value = parseExpression(scanner);
    return { kind, value, from, to: scanner.previousEnd };
  }
  if (scanner.kind !== 'name') {
    const value = parseExpression(scanner);
    return { kind: 'value', value, from, to: scanner.previousEnd };
  }
  const target = parseTarget(scanner, 'a constant');
  const value = scanner.take('=') ? parseExpression(scanner) : null;
  return { kind: 'constant', name: nameOfTarget(target), value, from, to: scanner.previousEnd };
}
