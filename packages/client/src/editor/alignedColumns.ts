import {
  EditorState,
  type Extension,
  type Range,
  RangeSetBuilder,
  type Text,
  type Transaction,
} from '@codemirror/state';
import {
  Decoration,
  type DecorationSet,
  EditorView,
  ViewPlugin,
  type ViewUpdate,
  WidgetType,
} from '@codemirror/view';
import { alignColumns, type TextChange } from '@stillroom/shared/notation';

/** A longer block is aligned within so many lines of what is seen. */
const longBlock = 400;

/**
 * An edit that would move more bars than this leaves them where they are in the text, and they are only drawn aligned:
 * every blank put in or taken out is a change that all co-authors receive.
 */
const mostMoved = 64;

const isBlank = (doc: Text, line: number): boolean => doc.line(line).text.trim() === '';

/** The lines from the blank line before `first` to the one after `last`, no more than a long block's worth each way. */
function blockAround(doc: Text, first: number, last: number): { first: number; last: number } {
  let from = first;
  let to = last;
  while (from > 1 && first - from < longBlock && !isBlank(doc, from) && !isBlank(doc, from - 1)) from -= 1;
  while (to < doc.lines && to - last < longBlock && !isBlank(doc, to) && !isBlank(doc, to + 1)) to += 1;
  return { first: from, last: to };
}

/** The changes that align the bars of the blocks that a stretch of a text touches. */
export function alignmentAround(doc: Text, from: number, to: number): readonly TextChange[] {
  const { first, last } = blockAround(doc, doc.lineAt(from).number, doc.lineAt(to).number);
  const start = doc.line(first).from;
  return alignColumns(doc.sliceString(start, doc.line(last).to)).map((change) => ({
    ...change,
    from: change.from + start,
    to: change.to + start,
  }));
}

/** What a person typed, deleted or pasted here; not what came from co-authors or is being composed. */
const isOwnEdit = (transaction: Transaction): boolean =>
  transaction.docChanged &&
  (transaction.isUserEvent('input') || transaction.isUserEvent('delete')) &&
  !transaction.isUserEvent('input.type.compose');

/** Aligns the block of one's own edit in the same transaction, so that one undo takes back both. */
const alignEdits = EditorState.transactionFilter.of((transaction) => {
  if (!isOwnEdit(transaction)) return transaction;
  let from = transaction.newDoc.length;
  let to = 0;
  transaction.changes.iterChangedRanges((_fromBefore, _toBefore, begin, end) => {
    from = Math.min(from, begin);
    to = Math.max(to, end);
  });
  if (to - from > longBlock * 100) return transaction;
  const changes = alignmentAround(transaction.newDoc, from, to);
  if (changes.length === 0 || changes.length > mostMoved) return transaction;
  return [transaction, { changes: [...changes], sequential: true }];
});

/** What was composed is aligned when the composition is over. */
const alignComposed = EditorView.domEventHandlers({
  compositionend(_event, view) {
    setTimeout(() => {
      if (view.composing || view.state.readOnly) return;
      const { head } = view.state.selection.main;
      const changes = alignmentAround(view.state.doc, head, head);
      if (changes.length > 0 && changes.length <= mostMoved)
        view.dispatch({ changes: [...changes], userEvent: 'align' });
    }, 0);
  },
});

/** Blank room before a bar, in letters; never part of the text. */
class Room extends WidgetType {
  constructor(private readonly letters: number) {
    super();
  }

  override eq(other: Room): boolean {
    return other.letters === this.letters;
  }

  toDOM(): HTMLElement {
    const room = document.createElement('span');
    room.className = 'room';
    room.style.width = `${this.letters}ch`;
    return room;
  }
}

/**
 * Room and collapsed blanks that make bars stand under one another where the text itself is not aligned: as it came from
 * a file, or while two people change one block. `caretLine` keeps its blanks: they are being typed.
 */
export function alignment(doc: Text, from: number, to: number, caretLine: number): Range<Decoration>[] {
  return alignmentAround(doc, from, to).flatMap((change) => {
    if (change.from === change.to)
      return [Decoration.widget({ widget: new Room(change.insert.length), side: 1 }).range(change.from)];
    if (doc.lineAt(change.from).number === caretLine) return [];
    return [Decoration.replace({}).range(change.from, change.to)];
  });
}

function build(view: EditorView): DecorationSet {
  const builder = new RangeSetBuilder<Decoration>();
  const { doc, selection } = view.state;
  const caretLine = doc.lineAt(selection.main.head).number;
  const { from, to } = view.viewport;
  for (const range of alignment(doc, from, to, caretLine)) builder.add(range.from, range.to, range.value);
  return builder.finish();
}

const drawAligned = ViewPlugin.fromClass(
  class {
    decorations: DecorationSet;
    private line = 0;

    constructor(view: EditorView) {
      this.decorations = build(view);
    }

    update(update: ViewUpdate): void {
      const { doc, selection } = update.state;
      const line = doc.lineAt(selection.main.head).number;
      if (update.docChanged || update.viewportChanged || line !== this.line)
        this.decorations = build(update.view);
      this.line = line;
    }
  },
  { decorations: (plugin) => plugin.decorations },
);

/** Keeps the bars of a network aligned while it is typed. */
export const alignedColumns: Extension = [alignEdits, alignComposed, drawAligned];
