import { type Extension, StateEffect, StateField, type Text } from '@codemirror/state';
import { Decoration, type DecorationSet, EditorView } from '@codemirror/view';
import { goesOn, rowNumbers } from './ledgerLines.ts';

/** Lights these rows of the ledger, by 0-based number; an empty set puts out what is lit. */
export const setLitRows = StateEffect.define<ReadonlySet<number>>();

interface Lit {
  readonly rows: ReadonlySet<number>;
  readonly decorations: DecorationSet;
}

const nothing: Lit = { rows: new Set(), decorations: Decoration.none };
const litLine = Decoration.line({ class: 'lit' });

/** The lines on which lit rows stand, 1-based; of a row that goes on over several lines all of them. */
export function linesOfRows(doc: Text, rows: ReadonlySet<number>): readonly number[] {
  const numbers = rowNumbers(doc.iterLines());
  const lines: number[] = [];
  let joined = false;
  let line = 0;
  for (const text of doc.iterLines()) {
    line += 1;
    const row = numbers[line - 1] ?? 0;
    const lit = row > 0 ? rows.has(row - 1) : joined && lines.at(-1) === line - 1;
    if (lit) lines.push(line);
    joined = goesOn(text);
  }
  return lines;
}

function light(doc: Text, rows: ReadonlySet<number>): Lit {
  if (rows.size === 0) return nothing;
  const ranges = linesOfRows(doc, rows).map((line) => litLine.range(doc.line(line).from));
  return { rows, decorations: Decoration.set(ranges) };
}

/** The rows that a witness names, lit in the ledger as they are in the graph. */
export const litLines: Extension = [
  StateField.define<Lit>({
    create: () => nothing,
    update(held, transaction) {
      const asked = transaction.effects.find((effect) => effect.is(setLitRows));
      if (asked !== undefined) return light(transaction.newDoc, asked.value);
      if (!transaction.docChanged || held.rows.size === 0) return held;
      // A witness is of the text it was found in: what is typed moves its lines along.
      return { ...held, decorations: held.decorations.map(transaction.changes) };
    },
    provide: (field) => EditorView.decorations.from(field, ({ decorations }) => decorations),
  }),
  EditorView.baseTheme({ '.cm-line.lit': { backgroundColor: 'var(--blue-wash)' } }),
];
