import { type EditorView, WidgetType } from '@codemirror/view';
import type { Complaint, Repair } from '@stillroom/shared/notation';

function repairButton(view: EditorView, repair: Repair, replaces: string, first: boolean): HTMLButtonElement {
  const button = document.createElement('button');
  button.type = 'button';
  button.className = first ? 'repair first' : 'quiet';
  button.textContent = repair.label;
  button.addEventListener('click', () => {
    const { from, to, insert } = repair;
    // The text may have changed since it was read; the next reading offers the repair at its new place.
    if (to > view.state.doc.length || view.state.sliceDoc(from, to) !== replaces) return;
    view.dispatch({
      changes: { from, to, insert },
      selection: { anchor: from + insert.length },
      userEvent: 'input.repair',
    });
    view.focus();
  });
  return button;
}

/** A complaint in place: what is wrong, why, and the likeliest repair as a button that names its result. */
export class ComplaintWidget extends WidgetType {
  constructor(
    /** By which the line it is about names it to a screen reader. */
    private readonly id: string,
    private readonly complaint: Complaint,
    /** Where in the document what it is about begins. */
    private readonly at: number,
    /** What each repair replaces. */
    private readonly replaced: readonly string[],
  ) {
    super();
  }

  override eq(other: ComplaintWidget): boolean {
    return (
      other.id === this.id &&
      other.at === this.at &&
      other.complaint.message === this.complaint.message &&
      JSON.stringify(other.complaint.repairs) === JSON.stringify(this.complaint.repairs) &&
      other.replaced.join() === this.replaced.join()
    );
  }

  toDOM(view: EditorView): HTMLElement {
    const { severity, message, hint, repairs, line } = this.complaint;
    const box = document.createElement('div');
    box.className = severity === 'error' ? 'say' : 'say doubt';
    box.id = this.id;
    box.setAttribute('role', 'note');
    box.setAttribute('aria-label', `${severity === 'error' ? 'Error' : 'Doubt'} in line ${line}`);
    const words = document.createElement('span');
    const what = document.createElement('b');
    what.textContent = message;
    words.append(what, hint === null ? '' : ` ${hint}`);
    box.append(words);
    if (repairs.length > 0 && !view.state.readOnly) {
      const actions = document.createElement('div');
      actions.className = 'do';
      actions.append(
        ...repairs.map((repair, i) => repairButton(view, repair, this.replaced[i] ?? '', i === 0)),
      );
      box.append(actions);
    }
    // The room above and below is padding: the editor does not count margins.
    const place = document.createElement('div');
    place.className = 'say-place';
    place.append(box);
    view.requestMeasure({
      read: () => (view.coordsAtPos(this.at)?.left ?? 0) - box.getBoundingClientRect().left,
      write: (x) => box.style.setProperty('--x', `${Math.max(8, Math.round(x) - 6)}px`),
    });
    return place;
  }

  override ignoreEvent(): boolean {
    return true;
  }
}
