import { functionNames } from '../../expression/expression.ts';
import type { FunctionName } from '../../expression/expression.ts';
import { printExpression } from '../../expression/print.ts';
import { commonSymbols } from '../../units/table.ts';
import type { LineSyntax } from '../ast.ts';
import { Complaints } from '../complaints.ts';
import { logicalLines } from '../lines.ts';
import type { LogicalLine } from '../lines.ts';
import { parseLine } from '../parse.ts';
import { endOfName, Scanner } from '../tokens.ts';
import { isStatementWord, statementWords } from '../words.ts';
import type { StatementWord } from '../words.ts';

export interface CompletionOption {
  readonly label: string;
  readonly kind: 'species' | 'constant' | 'keyword' | 'unit' | 'function';
  /** What it is, in a few words. */
  readonly detail: string;
}

export interface Completions {
  /** Where the word begins that an option replaces. */
  readonly from: number;
  readonly options: readonly CompletionOption[];
}

const statementDetails: Readonly<Record<StatementWord, string>> = {
  start: 'amounts at time 0',
  let: 'a constant, a derived value or an output',
  fix: 'species held constant',
  volume: 'turns concentrations into counts',
  in: 'places species in a volume',
  weight: 'rate factor of a species in counts',
  event: 'sets values when a condition turns true',
  rate: 'a rate equation of its own',
};

const functionDetails: Partial<Record<FunctionName, string>> = {
  if: 'if(condition, then, else)',
  hill: 'hill(x, K, n) = x^n/(K^n + x^n)',
  min: 'min(a, b, …)',
  max: 'max(a, b, …)',
};

const keyword = (label: string, detail: string): CompletionOption => ({ label, kind: 'keyword', detail });
const statements = statementWords.map((word) => keyword(word, statementDetails[word]));
const functions: readonly CompletionOption[] = [
  ...functionNames.map((label) => ({
    label,
    kind: 'function' as const,
    detail: functionDetails[label] ?? `${label}(x)`,
  })),
  { label: 'sum', kind: 'function', detail: 'sum(i = 1..L, X[i])' },
];
const units: readonly CompletionOption[] = commonSymbols.map((label) => ({
  label,
  kind: 'unit',
  detail: 'unit',
}));
const lawWords = [
  keyword('law', 'law = f in place of mass action'),
  keyword('net', 'net = f for both senses of <=>'),
];
const time = keyword('t', 'time');

/** What may stand at an offset of a text: names it has, words, units and functions that fit the place. */
export function completionsAt(text: string, offset: number): Completions {
  const lines = logicalLines(text);
  const line = lines.findLast((each) => each.from <= offset);
  const from = startOfWord(text, offset, line?.from ?? 0);
  const isBehindNewline = offset === text.length && /[\r\n]$/.test(text);
  const names = () => namesOf(text, offset, lines);
  if (!line || isBehindNewline) return { from, options: optionsAtBeginning(names) };
  return { from, options: offset > line.to ? [] : optionsAt(text, line, from, offset, names) };
}

function optionsAt(
  text: string,
  line: LogicalLine,
  from: number,
  offset: number,
  names: () => KnownNames,
): readonly CompletionOption[] {
  const column = line.bars.filter((bar) => bar < offset).length;
  if (column > 1) return [];
  const first = new Scanner(text, line.from, line.to, 'expression');
  const { word } = first;
  const isStatement = first.has('name') && isStatementWord(word) && first.to < from;
  const before = text.slice(
    column > 0 ? (line.bars[0] ?? line.from) + 1 : isStatement ? first.to : line.from,
    from,
  );
  if (column === 0 && !isStatement) {
    return before.trim() === '' ? optionsAtBeginning(names) : names().species;
  }
  if (isUnitPlace(before)) return units;
  const known = names();
  if (!isInValue(before)) {
    if (!isStatement) return [...known.constants, ...lawWords];
    return word === 'let' || word === 'volume'
      ? []
      : word === 'event'
        ? [keyword('when', 'condition')]
        : known.species;
  }
  return [...known.species, ...known.constants, ...functions, time];
}

function optionsAtBeginning(names: () => KnownNames): readonly CompletionOption[] {
  return [...names().species, ...statements];
}

/** Whether a number and at most a blank stand before, or a number and the beginning of a unit. */
function isUnitPlace(before: string): boolean {
  return (
    /(?:^|[\s=,(+*/<>-])[\d.]+(?:e[+-]?\d+)?\s+(?:[\p{L}\d^-]*\s?\/)*$|\)\s+$/iu.test(before) ||
    /[\d.]\s*\/$/.test(before)
  );
}

/** Whether an `=` without a comma behind it, or the condition of an event, stands before. */
function isInValue(before: string): boolean {
  let depth = 0;
  for (let at = before.length - 1; at >= 0; at -= 1) {
    const sign = before[at];
    if (sign === ')' || sign === ']') depth += 1;
    else if (sign === '(' || sign === '[') depth -= 1;
    else if (depth <= 0 && sign === '=') return true;
    else if (depth === 0 && sign === ',') return false;
  }
  return /^\s*when\s/.test(before);
}

function startOfWord(text: string, offset: number, least: number): number {
  let start = offset;
  for (let at = offset - 1; at >= least; at -= 1) {
    if (endOfName(text, at, offset) === offset) start = at;
    else if (endOfName(`A${text.slice(at, offset)}`, 0, offset - at + 1) !== offset - at + 1) break;
  }
  return start;
}

interface KnownNames {
  readonly species: readonly CompletionOption[];
  readonly constants: readonly CompletionOption[];
}

/** What a line gives names to: species, each once, and constants with their values as printed (null: named only). */
interface LineNames {
  readonly species: readonly string[];
  readonly constants: readonly (readonly [name: string, value: string | null])[];
}

/** The lines read last: with a key, one of them is new. */
const knownLines = new Map<string, LineNames>();
const KNOWN_LIMIT = 5000;

/** The names that a text gives, but for the word at the caret. */
function namesOf(text: string, offset: number, lines: readonly LogicalLine[]): KnownNames {
  const species = new Map<string, number>();
  const constants = new Map<string, string>();
  const scanner = new Scanner(text, 0, 0, 'expression');
  for (const line of lines) {
    if (line.from === line.to) continue;
    const names = namesOfLine(scanner, line, offset);
    for (const name of names.species) species.set(name, (species.get(name) ?? 0) + 1);
    for (const [name, value] of names.constants)
      if (value !== null || !constants.has(name)) constants.set(name, value ?? 'constant');
  }
  return {
    species: [...species].map(([label, rows]) => ({
      label,
      kind: 'species',
      detail: rows === 1 ? 'in 1 row' : `in ${rows} rows`,
    })),
    constants: [...constants].map(([label, detail]) => ({ label, kind: 'constant', detail })),
  };
}

function namesOfLine(scanner: Scanner, line: LogicalLine, offset: number): LineNames {
  const isAtCaret = (span: { from: number; to: number }) => span.from <= offset && offset <= span.to;
  if (isAtCaret(line)) return collectNames(parseLine(scanner, line, new Complaints('')), isAtCaret);
  const source = scanner.text.slice(line.from, line.to);
  const known = knownLines.get(source);
  if (known !== undefined) return known;
  if (knownLines.size >= KNOWN_LIMIT) knownLines.clear();
  const names = collectNames(parseLine(scanner, line, new Complaints('')), () => false);
  // A copy: a slice would hold on to the whole text for as long as it is remembered.
  knownLines.set(`${source} `.slice(0, -1), names);
  return names;
}

function collectNames(line: LineSyntax, skip: (span: { from: number; to: number }) => boolean): LineNames {
  if (line.kind === 'row') {
    const terms = line.sides
      .flatMap((side) => side.terms.map((term) => term.species))
      .filter((target) => !skip(target));
    return {
      species: [...new Set(terms.map((target) => target.name))],
      constants: line.items.flatMap((item) =>
        item.kind === 'constant' && !skip(item.name)
          ? [[item.name.name, item.value && printExpression(item.value)] as const]
          : [],
      ),
    };
  }
  const lets = line.kind === 'let' || line.kind === 'volume' ? line.items : [];
  return {
    species: [],
    constants: lets.flatMap(({ target, value }) =>
      skip(target) ? [] : [[target.name, printExpression(value)] as const],
    ),
  };
}
