import {
  type EditorState,
  type Extension,
  type Range,
  StateEffect,
  StateField,
  type Text,
} from '@codemirror/state';
import { Decoration, type DecorationSet, EditorView, ViewPlugin, type ViewUpdate } from '@codemirror/view';
import type { Complaint, Repair } from '@stillroom/shared/notation';
import { ComplaintWidget } from './complaintWidget.ts';

/** Reads a text and says what is wrong with it, at once or later. */
export type Check = (text: string) => readonly Complaint[] | Promise<readonly Complaint[]>;

const setComplaints = StateEffect.define<readonly Complaint[]>();

/** At most so many are shown in place; the rest are counted by the page. */
const shownAtMost = 20;

/** Tells the complaints of several editors on a page apart. */
let editors = 0;

interface Marked {
  readonly editor: number;
  readonly complaints: readonly Complaint[];
  readonly decorations: DecorationSet;
}

const idOf = (editor: number, place: number): string => `complaint-${editor}-${place}`;

function mark(state: EditorState, complaints: readonly Complaint[], editor: number): DecorationSet {
  const ranges: Range<Decoration>[] = [];
  const end = state.doc.length;
  const replaces = (repair: Repair): string => state.sliceDoc(repair.from, repair.to);
  for (const [place, complaint] of complaints.slice(0, shownAtMost).entries()) {
    const id = idOf(editor, place);
    const from = Math.min(complaint.from, end);
    const to = Math.min(Math.max(complaint.to, from), end);
    const line = state.doc.lineAt(from);
    const wrong = complaint.severity === 'error';
    const attributes = { 'aria-describedby': id };
    ranges.push(Decoration.line(wrong ? { class: 'er', attributes } : { attributes }).range(line.from));
    if (from < to) ranges.push(Decoration.mark({ class: wrong ? 'wavy' : 'wavy doubt' }).range(from, to));
    ranges.push(
      Decoration.widget({
        widget: new ComplaintWidget(id, complaint, from, complaint.repairs.map(replaces)),
        block: true,
        side: 1,
      }).range(line.to),
    );
  }
  return Decoration.set(ranges, true);
}

/** The complaints of a text, mapped through changes until the next check. */
export const complaintField = StateField.define<Marked>({
  create: () => ({ editor: (editors += 1), complaints: [], decorations: Decoration.none }),
  update(held, transaction) {
    for (const effect of transaction.effects)
      if (effect.is(setComplaints))
        return {
          editor: held.editor,
          complaints: effect.value,
          decorations: mark(transaction.state, effect.value, held.editor),
        };
    return transaction.docChanged
      ? { ...held, decorations: held.decorations.map(transaction.changes) }
      : held;
  },
  provide: (field) => EditorView.decorations.from(field, ({ decorations }) => decorations),
});

/** While the caret is in a line with complaints the text as a whole is described by them: what a screen reader tells of it. */
const describeCaret = EditorView.contentAttributes.of((view): Record<string, string> => {
  const { state } = view;
  const { editor, complaints } = state.field(complaintField);
  const line = state.doc.lineAt(state.selection.main.head).number;
  const ids = complaints
    .slice(0, shownAtMost)
    .flatMap((complaint, place) => (complaint.line === line ? [idOf(editor, place)] : []));
  return ids.length === 0 ? {} : { 'aria-describedby': ids.join(' '), 'aria-invalid': 'true' };
});

/** Milliseconds after a change before the text is checked: some frames, so that typing is never held up. */
export const soon = 60;
/** Milliseconds more until the line one types in is told what is new there: not to scold a word half typed. */
export const untilRest = 340;

const nameOf = (complaint: Complaint): string => `${complaint.severity} ${complaint.message}`;

/** What may be shown at once: all but what is new in the line of the caret. */
export function shownAtOnce(
  found: readonly Complaint[],
  shown: readonly Complaint[],
  caretLine: number,
): readonly Complaint[] {
  const before = new Set(shown.map(nameOf));
  return found.filter((complaint) => complaint.line !== caretLine || before.has(nameOf(complaint)));
}

/**
 * Shows complaints under their lines, each with its repairs. `told` hears of them too, for the list above the text that a
 * screen reader meets first.
 */
export function complaints(check: Check, told: (complaints: readonly Complaint[]) => void): Extension {
  const checker = ViewPlugin.fromClass(
    class {
      private timer: ReturnType<typeof setTimeout> | undefined;
      private last: readonly Complaint[] = [];
      private gone = false;
      /** The text that is being checked elsewhere. */
      private asked: Text | null = null;

      constructor(private readonly view: EditorView) {
        this.wait(0, () => this.check());
      }

      update(update: ViewUpdate): void {
        if (update.docChanged) this.wait(soon, () => this.check());
      }

      private wait(time: number, then: () => void): void {
        clearTimeout(this.timer);
        this.timer = setTimeout(then, time);
      }

      private check(): void {
        const { doc } = this.view.state;
        // One text is read elsewhere at a time; the newest is asked for when the answer comes.
        if (this.asked !== null) return;
        const answer = check(doc.toString());
        if (!('then' in answer)) {
          this.show(answer);
          return;
        }
        this.asked = doc;
        void answer.then((found) => {
          this.asked = null;
          if (this.gone) return;
          if (this.view.state.doc === doc) this.show(found);
          else this.wait(soon, () => this.check());
        });
      }

      private show(found: readonly Complaint[]): void {
        const { state, hasFocus } = this.view;
        const line = hasFocus ? state.doc.lineAt(state.selection.main.head).number : 0;
        const now = shownAtOnce(found, this.last, line);
        this.put(now);
        if (now.length < found.length) this.wait(untilRest, () => this.put(found));
      }

      private put(found: readonly Complaint[]): void {
        if (found.length === 0 && this.last.length === 0) return;
        this.last = found;
        this.view.dispatch({ effects: setComplaints.of(found) });
        told(found);
      }

      destroy(): void {
        this.gone = true;
        clearTimeout(this.timer);
      }
    },
  );
  return [complaintField, describeCaret, checker];
}
