import { type AssignmentSyntax, parseNetwork, type TextChange } from '@stillroom/shared/notation';

/** The expressions of the syntax tree, as an assignment holds one. */
type Expression = AssignmentSyntax['value'];

/** The number a value is written with, its unit apart; null where it is reckoned from others. */
function numberOf(value: Expression): { from: number; to: number; text: string } | null {
  const inner = value.kind === 'measured' ? value.of : value;
  return inner.kind === 'number' ? inner : null;
}

/** Where a text gives a constant or a start its value; null where it does not, or for a whole family. */
function findValue(text: string, kind: 'constants' | 'start', name: string): Expression | null {
  for (const line of parseNetwork(text).tree.lines) {
    if (line.kind === 'row' && kind === 'constants') {
      for (const item of line.items)
        if (item.kind === 'constant' && item.name.name === name && item.name.indices === null && item.value)
          return item.value;
    }
    if (line.kind === (kind === 'start' ? 'start' : 'let')) {
      for (const item of (line as { items: readonly AssignmentSyntax[] }).items) {
        const { target } = item;
        if (item.family === null && target.name === name && target.indices === null) return item.value;
      }
    }
  }
  return null;
}

/**
 * The change that writes a value into a network's text in place of the one it has there, in the unit it is written in.
 * `own` and `value` are in the unit of the results.
 *
 * @returns null where the text gives the name no plain number
 */
export function valueChange(
  text: string,
  kind: 'constants' | 'start',
  name: string,
  { own, value }: { readonly own: number; readonly value: number },
): TextChange | null {
  const found = findValue(text, kind, name);
  const number = found === null ? null : numberOf(found);
  if (number === null) return null;
  const written = Number(number.text);
  // Where the text has another unit than the results, the number changes in proportion.
  const next = written === own || own === 0 ? value : Number(((written * value) / own).toPrecision(12));
  return { from: number.from, to: number.to, insert: String(next) };
}
