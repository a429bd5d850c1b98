import { printExpression, printRange } from '../expression/print.ts';
import type { ExpressionSyntax } from '../expression/syntax.ts';
import type {
  AssignmentSyntax,
  FamilySyntax,
  ItemSyntax,
  LineSyntax,
  NetworkTree,
  RowSyntax,
  SideSyntax,
  TargetSyntax,
  TermSyntax,
} from './ast.ts';
import { columnWidths, pad } from './columns.ts';

/**
 * The canonical text of a tree: one space between words, ASCII arrows, columns aligned within each block of lines,
 * comments and notes kept. Reading it gives the same tree but for places.
 */
export function printNetwork(tree: NetworkTree): string {
  const printed = tree.lines.map((line) => (line.kind === 'row' ? rowColumns(line) : null));
  const widths = columnWidths(
    printed,
    tree.lines.map((line) => line.kind === 'blank' && line.comment === null),
  );
  return tree.lines
    .map((line, i) => {
      const columns = printed[i];
      const body = columns ? joinColumns(columns, widths[i] ?? []) : printStatement(line);
      return `${withComment(body, line.comment)}\n`;
    })
    .join('');
}

/** Reaction, constants and note of a row, without empty columns at the end. */
export function rowColumns(row: RowSyntax): readonly string[] {
  const columns = [printReaction(row), printItems(row.items), row.note];
  while (columns.length > 1 && columns.at(-1) === '') columns.pop();
  return columns;
}

/** Columns with bars between them, each but the last padded to its width. */
export function joinColumns(columns: readonly string[], widths: readonly number[]): string {
  return columns
    .map((column, i) => (i < columns.length - 1 ? pad(column, widths[i] ?? 0) : column))
    .join(' | ')
    .trimEnd();
}

function withComment(body: string, comment: string | null): string {
  if (comment === null) return body;
  const kept = `#${comment.trimEnd()}`;
  return body === '' ? kept : `${body}  ${kept}`;
}

/** `2 A + B <=> C -> 0` with its family before it. */
export function printReaction(row: Pick<RowSyntax, 'family' | 'sides' | 'arrows'>): string {
  const [first, ...rest] = row.sides;
  let text = row.family ? `[${printFamily(row.family)}] ` : '';
  if (first) text += printSide(first);
  rest.forEach((side, i) => (text += ` ${row.arrows[i]?.sign ?? '->'} ${printSide(side)}`));
  return text;
}

function printSide(side: SideSyntax): string {
  return side.terms.length === 0 ? '0' : side.terms.map(printTerm).join(' + ');
}

function printTerm({ numerator, denominator, species }: TermSyntax): string {
  const name = printTarget(species);
  if (denominator !== 1) return `${numerator}/${denominator} ${name}`;
  return numerator === 1 ? name : `${numerator} ${name}`;
}

function printTarget(target: TargetSyntax): string {
  return printExpression({ kind: 'name', ...target });
}

function printFamily(family: FamilySyntax): string {
  const ranges = family.ranges.map(printRange).join(', ');
  return family.where ? `${ranges} where ${printExpression(family.where)}` : ranges;
}

/** The constants column. */
export function printItems(items: readonly ItemSyntax[]): string {
  return items.map(printItem).join(', ');
}

function printItem(item: ItemSyntax): string {
  if (item.kind === 'value') return printValue(item.value);
  if (item.kind !== 'constant') return `${item.kind} = ${printExpression(item.value)}`;
  const name = printExpression(item.name);
  return item.value ? `${name} = ${printExpression(item.value)}` : name;
}

/** A value without name: more than a number stands in brackets, since a name there would be a constant's. */
function printValue(value: ExpressionSyntax): string {
  const isPlain = value.kind === 'number' || value.kind === 'measured';
  return isPlain ? printExpression(value) : `(${printExpression(value)})`;
}

function printAssignment(item: AssignmentSyntax, after: string): string {
  const family = item.family ? ` for ${printFamily(item.family)}` : '';
  return `${printTarget(item.target)} = ${printExpression(item.value)}${after}${family}`;
}

/** A line that is no row, without its comment; "" for a blank one. */
export function printStatement(line: LineSyntax): string {
  switch (line.kind) {
    case 'blank':
    case 'row':
      return '';
    case 'broken':
      return line.source;
    case 'in': {
      const species = line.species.map(
        ({ target, family }) => printTarget(target) + (family ? ` for ${printFamily(family)}` : ''),
      );
      return `in ${printTarget(line.compartment)}: ${species.join(', ')}`;
    }
    case 'event':
      return `event when ${printExpression(line.when)}: ${line.set.map((item) => printAssignment(item, '')).join(', ')}`;
    default: {
      const after = line.kind === 'weight' ? ' in n' : '';
      return `${line.kind} ${line.items.map((item) => printAssignment(item, after)).join(', ')}`;
    }
  }
}
