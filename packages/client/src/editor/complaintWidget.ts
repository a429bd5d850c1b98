import { type EditorView, WidgetType } from '@codemirror/view';
import type { Complaint, Repair } from '@stillroom/shared/notation';

/** Id that ties a line's complaint to the text for a screen reader. */
let numbered = 0;

function repairButton(view: EditorView, repair: Repair, first: boolean): HTMLButtonElement {
  const button = document.createElement('button');
  button.type = 'button';
  button.className = first ? 'repair first' : 'quiet';
  button.textContent = repair.label;
  button.addEventListener('click', () => {
    const length = view.state.doc.length;
    const from = Math.min(repair.from, length);
    view.dispatch({
      changes: { from, to: Math.min(repair.to, length), insert: repair.insert },
      selection: { anchor: from + repair.insert.length },
      userEvent: 'input.repair',
    });
    view.focus();
  });
  return button;
}

/** A complaint in place: what is wrong, why, and the likeliest repair as a button that names its result. */
export class ComplaintWidget extends WidgetType {
  constructor(
    private readonly complaint: Complaint,
    /** Letters from the beginning of the line to what it is about. */
    private readonly letters: number,
  ) {
    super();
  }

  override eq(other: ComplaintWidget): boolean {
    return (
      other.letters === this.letters &&
      other.complaint.message === this.complaint.message &&
      other.complaint.from === this.complaint.from &&
      JSON.stringify(other.complaint.repairs) === JSON.stringify(this.complaint.repairs)
    );
  }

  toDOM(view: EditorView): HTMLElement {
    const { severity, message, hint, repairs, line } = this.complaint;
    const box = document.createElement('div');
    box.className = severity === 'error' ? 'say' : 'say doubt';
    box.id = `complaint-${(numbered += 1)}`;
    box.setAttribute('role', 'note');
    box.setAttribute('aria-label', `${severity === 'error' ? 'Error' : 'Doubt'} in line ${line}`);
    box.style.setProperty('--x', `${Math.max(this.letters, 0)}ch`);
    const words = document.createElement('span');
    const what = document.createElement('b');
    what.textContent = message;
    words.append(what, hint === null ? '' : ` ${hint}`);
    box.append(words);
    if (repairs.length > 0 && !view.state.readOnly) {
      const actions = document.createElement('div');
      actions.className = 'do';
      actions.append(...repairs.map((repair, i) => repairButton(view, repair, i === 0)));
      box.append(actions);
    }
    return box;
  }

  override ignoreEvent(): boolean {
    return true;
  }
}
