import { type Extension, StateField } from '@codemirror/state';
import { gutter, GutterMarker, gutters } from '@codemirror/view';
import { rowNumbers } from './ledgerLines.ts';

class RowMarker extends GutterMarker {
  constructor(private readonly row: number) {
    super();
  }

  override eq(other: RowMarker): boolean {
    return other.row === this.row;
  }

  override toDOM(): Node {
    return document.createTextNode(`R${this.row}`);
  }
}

const numbers = StateField.define<readonly number[]>({
  create: (state) => rowNumbers(state.doc.iterLines()),
  update: (held, transaction) => (transaction.docChanged ? rowNumbers(transaction.newDoc.iterLines()) : held),
});

/** Reaction numbers left of the margin line: R1, R2 …, for the lines that write reactions. */
export const rowGutter: Extension = [
  numbers,
  gutters({ fixed: false }),
  gutter({
    class: 'cm-rows',
    lineMarker(view, block) {
      const line = view.state.doc.lineAt(block.from).number;
      const row = view.state.field(numbers)[line - 1] ?? 0;
      return row > 0 ? new RowMarker(row) : null;
    },
    lineMarkerChange: (update) => update.startState.field(numbers) !== update.state.field(numbers),
  }),
];
