import { type Extension, type Range, RangeSetBuilder, type Text } from '@codemirror/state';
import {
  Decoration,
  type DecorationSet,
  type EditorView,
  ViewPlugin,
  type ViewUpdate,
  WidgetType,
} from '@codemirror/view';
import { barsOf, isRow } from './ledgerLines.ts';

/** A longer column pushes its own bar only, as in the canonical print. */
const widest = 60;

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

interface Columns {
  readonly bars: readonly number[];
  /** Letters of each column without the blanks before its bar. */
  readonly lengths: readonly number[];
}

function columnsOf(line: string): Columns | null {
  const bars = barsOf(line);
  if (bars.length === 0 || !isRow(line)) return null;
  const lengths = bars.map((bar, i) => line.slice(i === 0 ? 0 : (bars[i - 1] ?? 0), bar).trimEnd().length);
  return { bars, lengths };
}

/**
 * Room and collapsed blanks that make the bars of each block of rows stand under one another. The text itself is not
 * changed, so that aligning never meets what a co-author types. `caretLine` keeps its blanks: they are being typed.
 */
export function alignment(doc: Text, caretLine: number): readonly Range<Decoration>[] {
  const lines = [...doc.iterLines()].map(columnsOf);
  const ranges: Range<Decoration>[] = [];
  let begin = 0;
  while (begin < lines.length) {
    let end = begin;
    const widths: number[] = [];
    for (; end < lines.length && doc.line(end + 1).length > 0; end++)
      lines[end]?.lengths.forEach((length, i) => {
        if (length <= widest) widths[i] = Math.max(widths[i] ?? 0, length);
      });
    for (let i = begin; i < end; i++) {
      const columns = lines[i];
      if (columns === undefined || columns === null) continue;
      const line = doc.line(i + 1);
      columns.bars.forEach((bar, c) => {
        const length = columns.lengths[c] ?? 0;
        const start = c === 0 ? 0 : (columns.bars[c - 1] ?? 0);
        const blanks = bar - start - length;
        const room = (widths[c] ?? length) + 1 - length - blanks;
        if (room > 0)
          ranges.push(Decoration.widget({ widget: new Room(room), side: 1 }).range(line.from + bar));
        else if (room < 0 && i + 1 !== caretLine)
          ranges.push(Decoration.replace({}).range(line.from + bar + room, line.from + bar));
      });
    }
    begin = Math.max(end, begin) + 1;
  }
  return ranges;
}

function build(view: EditorView): DecorationSet {
  const builder = new RangeSetBuilder<Decoration>();
  const caretLine = view.state.doc.lineAt(view.state.selection.main.head).number;
  for (const { from, to, value } of alignment(view.state.doc, caretLine)) builder.add(from, to, value);
  return builder.finish();
}

/** Keeps the bars of a network aligned while it is typed. */
export const alignedColumns: Extension = ViewPlugin.fromClass(
  class {
    decorations: DecorationSet;

    constructor(view: EditorView) {
      this.decorations = build(view);
    }

    update(update: ViewUpdate): void {
      if (update.docChanged || update.selectionSet) this.decorations = build(update.view);
    }
  },
  { decorations: (plugin) => plugin.decorations },
);
