import { readUnit } from '../../units/parse.ts';
import { logicalLines } from '../lines.ts';
import { Scanner } from '../tokens.ts';
import { isFunctionName, isKeyword, isStatementWord } from '../words.ts';

/** What a stretch of a line is, for its colour. `name` is a constant or an index. */
export type HighlightStyle =
  | 'species'
  | 'arrow'
  | 'bar'
  | 'number'
  | 'unit'
  | 'name'
  | 'note'
  | 'comment'
  | 'keyword'
  | 'operator'
  | 'error';

export interface Highlight {
  readonly from: number;
  readonly to: number;
  readonly style: HighlightStyle;
}

/** Statements whose targets are species. */
const speciesStatements = new Set(['start', 'fix', 'weight', 'rate', 'in']);
const arrows = new Set(['->', '<-', '<=>']);

/**
 * The coloured stretches of one line of the text, in order and without overlap; blanks are left out. `column`: how many
 * bars came before, for a line that goes on from one that ends in `\`. Reads the line alone and never fails.
 */
export function highlightLine(line: string, column = 0): Highlight[] {
  const [logical] = logicalLines(line);
  if (!logical) return [];
  const found: Highlight[] = [];
  const add = (from: number, to: number, style: HighlightStyle) => {
    if (to > from) found.push({ from, to, style });
  };
  const ends = [...logical.bars, logical.to];
  let from = logical.from;
  ends.forEach((end, i) => {
    const place = column + i;
    if (place === 0) highlightReaction(line, from, end, add);
    else if (place === 1) highlightValues(new Scanner(line, from, end, 'expression'), 'name', add);
    else
      add(from + leadingBlanks(line.slice(from, end)), from + line.slice(from, end).trimEnd().length, 'note');
    if (i < ends.length - 1) {
      if (place < 2) add(end, end + 1, 'bar');
      else add(end, end + 1, 'note');
    }
    from = end + 1;
  });
  if (logical.comment !== null) add(logical.to, line.length, 'comment');
  return found;
}

type Add = (from: number, to: number, style: HighlightStyle) => void;

const leadingBlanks = (text: string) => text.length - text.trimStart().length;

/** The first column: a statement or the reaction of a row. */
function highlightReaction(line: string, from: number, to: number, add: Add): void {
  const scanner = new Scanner(line, from, to, 'expression');
  if (scanner.has('name') && isStatementWord(scanner.word)) {
    add(scanner.from, scanner.to, 'keyword');
    const targets = speciesStatements.has(scanner.word) ? 'species' : 'name';
    scanner.advance();
    highlightValues(scanner, targets, add);
    return;
  }
  highlightSides(new Scanner(line, from, to, 'row'), add);
}

function highlightSides(scanner: Scanner, add: Add): void {
  for (let depth = 0; !scanner.has('end'); scanner.advance()) {
    if (scanner.is('[')) depth += 1;
    if (scanner.is(']')) depth -= 1;
    add(scanner.from, scanner.to, styleInSides(scanner, depth));
  }
}

function styleInSides(scanner: Scanner, depth: number): HighlightStyle {
  if (scanner.kind === 'name') {
    if (isKeyword(scanner.word)) return depth > 0 ? 'keyword' : 'error';
    return depth > 0 ? 'name' : 'species';
  }
  if (scanner.kind === 'number') return 'number';
  if (scanner.kind === 'unknown') return 'error';
  return arrows.has(scanner.word) && depth === 0 ? 'arrow' : 'operator';
}

/** Items with values: the name that begins an item has a style of its own. */
function highlightValues(scanner: Scanner, target: HighlightStyle, add: Add): void {
  let depth = 0;
  let begins = true;
  while (!scanner.has('end')) {
    const { from, to, kind, word } = scanner;
    if (scanner.is('(') || scanner.is('[')) depth += 1;
    if (scanner.is(')') || scanner.is(']')) depth -= 1;
    if (kind === 'name') add(from, to, styleOfName(word, begins ? target : 'name'));
    else add(from, to, kind === 'symbol' ? 'operator' : kind === 'number' ? 'number' : 'error');
    begins = depth === 0 && (scanner.is(',') || scanner.is(':'));
    const mayHaveUnit = kind === 'number' || scanner.is(')');
    scanner.advance();
    if (mayHaveUnit) highlightUnit(scanner, add);
  }
}

function styleOfName(word: string, otherwise: HighlightStyle): HighlightStyle {
  return isKeyword(word) || isFunctionName(word) ? 'keyword' : otherwise;
}

function highlightUnit(scanner: Scanner, add: Add): void {
  const from = scanner.from;
  if (readUnit(scanner).length > 0) add(from, scanner.previousEnd, 'unit');
}
