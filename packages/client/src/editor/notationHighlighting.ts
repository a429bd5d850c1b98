import { type Extension, RangeSetBuilder, type Text } from '@codemirror/state';
import { Decoration, type DecorationSet, EditorView, ViewPlugin, type ViewUpdate } from '@codemirror/view';
import { type Highlight, highlightLine, type HighlightStyle } from '@stillroom/shared/notation';
import { goesOn } from './ledgerLines.ts';

/** Species, arrows and names are in ink like the rest and need no mark of their own. */
const classes: Partial<Record<HighlightStyle, string>> = {
  arrow: 'nt-arrow',
  bar: 'nt-bar',
  number: 'nt-number',
  unit: 'nt-number',
  note: 'nt-note',
  comment: 'nt-comment',
  keyword: 'nt-keyword',
  error: 'nt-error',
};

const marks = new Map(
  Object.values(classes).map((name) => [name, Decoration.mark({ class: name })] as const),
);

/** The colours of the ledger: numbers blue, notes green, bars and comments grey, the rest in ink. */
const colours = EditorView.theme({
  '.nt-arrow': { fontWeight: '500' },
  '.nt-bar': { color: 'var(--rule-strong)' },
  '.nt-number': { color: 'var(--blue)' },
  '.nt-note': { color: 'var(--green)' },
  '.nt-comment': { color: 'var(--ink3)' },
  '.nt-keyword': { fontWeight: '500' },
  '.nt-error': { color: 'var(--brick)' },
});

/** Lines are read again and again while one scrolls and types; so many are remembered. */
const remembered = 4000;
const known = new Map<string, readonly Highlight[]>();

/** The stretches of a line that need a colour, from memory where the same line was read before. */
export function coloursOf(line: string, column: number): readonly Highlight[] {
  const key = `${column}${line}`;
  const before = known.get(key);
  if (before !== undefined) return before;
  if (known.size >= remembered) known.clear();
  const found = highlightLine(line, column).filter(({ style }) => classes[style] !== undefined);
  known.set(key, found);
  return found;
}

/** How many bars came before a line, in the lines that a `\` joins to it. */
export function columnOf(doc: Text, number: number): number {
  let column = 0;
  for (let before = number - 1; before > 0; before--) {
    const { text } = doc.line(before);
    if (!goesOn(text)) break;
    column += text.split('|').length - 1;
  }
  return column;
}

function build(view: EditorView): DecorationSet {
  const builder = new RangeSetBuilder<Decoration>();
  const { doc } = view.state;
  let last = 0;
  for (const visible of view.visibleRanges) {
    for (let at = visible.from; at <= visible.to;) {
      const line = doc.lineAt(at);
      at = line.to + 1;
      if (line.number === last) continue;
      last = line.number;
      for (const { from, to, style } of coloursOf(line.text, columnOf(doc, line.number))) {
        const mark = marks.get(classes[style] ?? '');
        if (mark !== undefined) builder.add(line.from + from, line.from + to, mark);
      }
    }
  }
  return builder.finish();
}

/** Colours the notation as the notation's own reader sees it, where it is in view. */
export const notationHighlighting: Extension = [
  colours,
  ViewPlugin.fromClass(
    class {
      decorations: DecorationSet;

      constructor(view: EditorView) {
        this.decorations = build(view);
      }

      update(update: ViewUpdate): void {
        if (update.docChanged || update.viewportChanged) this.decorations = build(update.view);
      }
    },
    { decorations: (plugin) => plugin.decorations },
  ),
];
