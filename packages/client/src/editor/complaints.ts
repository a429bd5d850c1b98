import { type EditorState, type Extension, type Range, StateEffect, StateField } from '@codemirror/state';
import { Decoration, type DecorationSet, EditorView, ViewPlugin, type ViewUpdate } from '@codemirror/view';
import type { Complaint } from '@stillroom/shared/notation';
import { ComplaintWidget } from './complaintWidget.ts';

/** Reads a text and says what is wrong with it. */
export type Check = (text: string) => readonly Complaint[];

const setComplaints = StateEffect.define<readonly Complaint[]>();

/** At most so many are shown in place; the rest are counted by the page. */
const shownAtMost = 20;

interface Marked {
  readonly complaints: readonly Complaint[];
  readonly decorations: DecorationSet;
}

function mark(state: EditorState, complaints: readonly Complaint[]): DecorationSet {
  const ranges: Range<Decoration>[] = [];
  const end = state.doc.length;
  for (const complaint of complaints.slice(0, shownAtMost)) {
    const from = Math.min(complaint.from, end);
    const to = Math.min(Math.max(complaint.to, from), end);
    const line = state.doc.lineAt(from);
    const wrong = complaint.severity === 'error';
    if (wrong) ranges.push(Decoration.line({ class: 'er' }).range(line.from));
    if (from < to) ranges.push(Decoration.mark({ class: wrong ? 'wavy' : 'wavy doubt' }).range(from, to));
    ranges.push(
      Decoration.widget({
        widget: new ComplaintWidget(complaint, from),
        block: true,
        side: 1,
      }).range(line.to),
    );
  }
  return Decoration.set(ranges, true);
}

/** The complaints of a text, mapped through changes until the next check. */
export const complaintField = StateField.define<Marked>({
  create: () => ({ complaints: [], decorations: Decoration.none }),
  update(held, transaction) {
    for (const effect of transaction.effects)
      if (effect.is(setComplaints))
        return { complaints: effect.value, decorations: mark(transaction.state, effect.value) };
    return transaction.docChanged
      ? { ...held, decorations: held.decorations.map(transaction.changes) }
      : held;
  },
  provide: (field) => EditorView.decorations.from(field, ({ decorations }) => decorations),
});

/** Milliseconds of rest before a text is checked: long enough not to scold a word half typed. */
const rest = 350;

/**
 * Shows complaints under their lines, each with its repairs. `told` hears how many errors stand, for the list above
 * the text that a screen reader meets first.
 */
export function complaints(check: Check, told: (complaints: readonly Complaint[]) => void): Extension {
  const checker = ViewPlugin.fromClass(
    class {
      private timer: ReturnType<typeof setTimeout> | undefined;
      private last: readonly Complaint[] = [];

      constructor(private readonly view: EditorView) {
        this.schedule(0);
      }

      update(update: ViewUpdate): void {
        if (update.docChanged) this.schedule(rest);
      }

      private schedule(wait: number): void {
        clearTimeout(this.timer);
        this.timer = setTimeout(() => {
          const found = check(this.view.state.doc.toString());
          if (found.length === 0 && this.last.length === 0) return;
          this.last = found;
          this.view.dispatch({ effects: setComplaints.of(found) });
          told(found);
        }, wait);
      }

      destroy(): void {
        clearTimeout(this.timer);
      }
    },
  );
  return [complaintField, checker];
}
