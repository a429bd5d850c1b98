import { Compartment, EditorState, type Extension, Prec } from '@codemirror/state';
import { drawSelection, EditorView, keymap } from '@codemirror/view';
import type { Awareness } from 'y-protocols/awareness';
import { limits } from '@stillroom/shared/protocol';
import { ySync, ySyncAnnotation, YSyncConfig, ySyncFacet } from 'y-codemirror.next';
import type * as Y from 'yjs';
import { contentNonce } from '../composables/contentNonce.ts';
import { editorKeys } from './keys.ts';
import { remoteCursors } from './remoteCursors.ts';
import { editorTheme } from './theme.ts';

export interface EditorPlan {
  readonly parent: HTMLElement;
  readonly text: Y.Text;
  readonly awareness: Awareness;
  /** One's own changes of the whole notebook; null where nobody may write. */
  readonly undo: Y.UndoManager | null;
  readonly readOnly: boolean;
  /** Accessible name. */
  readonly label: string;
  readonly language: Extension;
  /** Hears that what was typed or pasted does not fit into a cell any more, and was not taken. */
  readonly full: () => void;
  /** Leaves the editor, for Escape. */
  readonly leave: () => void;
}

/** A running editor; `destroy` undoes everything `bindEditor` did. */
export interface BoundEditor {
  readonly view: EditorView;
  setReadOnly(readOnly: boolean): void;
  destroy(): void;
}

/** Binds an editor to a live text: both ways by origin, with co-authors' cursors and the notebook's own undo. */
export function bindEditor(plan: EditorPlan): BoundEditor {
  const { text, awareness, undo } = plan;
  const sync = new YSyncConfig(text, awareness);
  const access = new Compartment();
  const accessOf = (readOnly: boolean): Extension => [
    EditorState.readOnly.of(readOnly),
    EditorView.editable.of(!readOnly),
    // Where nobody may type the text can still be reached and read by keyboard.
    EditorView.contentAttributes.of({ 'aria-label': plan.label, ...(readOnly ? { tabindex: '0' } : {}) }),
  ];
  const step = (direction: 'undo' | 'redo') => () => {
    undo?.[direction]();
    return true;
  };
  const view = new EditorView({
    parent: plan.parent,
    state: EditorState.create({
      doc: text.toString(),
      extensions: [
        EditorView.cspNonce.of(contentNonce),
        access.of(accessOf(plan.readOnly)),
        ySyncFacet.of(sync),
        ySync,
        remoteCursors(text, awareness),
        undo === null
          ? []
          : Prec.high(
              keymap.of([
                { key: 'Mod-z', run: step('undo'), preventDefault: true },
                { key: 'Mod-y', mac: 'Mod-Shift-z', run: step('redo'), preventDefault: true },
                { key: 'Mod-Shift-z', run: step('redo'), preventDefault: true },
              ]),
            ),
        EditorState.changeFilter.of((transaction) => {
          // A cell's text has a bound; what co-authors wrote is never filtered.
          if (transaction.annotation(ySyncAnnotation) !== undefined) return true;
          const fits =
            transaction.newDoc.length <= limits.cellText ||
            transaction.newDoc.length < transaction.startState.doc.length;
          if (!fits) plan.full();
          return fits;
        }),
        plan.language,
        keymap.of([...editorKeys, { key: 'Escape', run: () => (plan.leave(), true) }]),
        drawSelection(),
        editorTheme,
      ],
    }),
  });
  undo?.addTrackedOrigin(sync);
  return {
    view,
    setReadOnly: (readOnly) => view.dispatch({ effects: access.reconfigure(accessOf(readOnly)) }),
    destroy() {
      undo?.removeTrackedOrigin(sync);
      view.destroy();
    },
  };
}
