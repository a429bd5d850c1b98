import type { EditorState, Extension } from '@codemirror/state';
import { EditorView } from '@codemirror/view';
import { parseNetwork, textOfReactionList } from '@stillroom/shared/notation';

const numbering = /^\s*\(?R?(\d+)[.:)]\s+/i;

/** Whether the lines are numbered 1, 2, 3 …, so that the numbers are no coefficients. */
function isNumbered(text: string): boolean {
  const lines = text.split(/[;\r\n]+/).filter((line) => line.trim() !== '');
  const numbers = lines.map((line) => Number(numbering.exec(line)?.[1] ?? NaN));
  return numbers.length > 1 && numbers.every((number, i) => i === 0 || number === (numbers[i - 1] ?? 0) + 1);
}

/**
 * What goes into a text when a list of reactions is pasted: its notation, where the list is not in it already and begins a
 * line (`before` is what stands before it there); anything else as it is.
 */
export function notationOfPasted(pasted: string, before: string): string {
  if (before.trim() !== '') return pasted;
  if (!isNumbered(pasted) && parseNetwork(pasted).complaints.length === 0) return pasted;
  const notation = textOfReactionList(pasted);
  if (notation === null) return pasted;
  return /[\r\n]$/.test(pasted) ? notation : notation.trimEnd();
}

/** Turns pasted lists of reactions into notation. */
export const pastedReactions: Extension = EditorView.clipboardInputFilter.of(
  (pasted: string, state: EditorState) => {
    const { from } = state.selection.main;
    return notationOfPasted(pasted, state.sliceDoc(state.doc.lineAt(from).from, from));
  },
);
