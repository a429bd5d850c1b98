import { type Extension, type Range, StateEffect } from '@codemirror/state';
import {
  Decoration,
  type DecorationSet,
  type EditorView,
  ViewPlugin,
  type ViewUpdate,
  WidgetType,
} from '@codemirror/view';
import type { Presence } from '@stillroom/shared/protocol';
import type { Awareness } from 'y-protocols/awareness';
import type * as Y from 'yjs';
import { hueClass } from './hues.ts';
import { OwnCursor, placeIn } from './travellingCursors.ts';

const moved = StateEffect.define<null>();

/** A caret with its owner's name to the right of it. */
class CaretWidget extends WidgetType {
  constructor(
    private readonly name: string,
    private readonly hue: number,
  ) {
    super();
  }

  override eq(other: CaretWidget): boolean {
    return other.name === this.name && other.hue === this.hue;
  }

  toDOM(): HTMLElement {
    const caret = document.createElement('span');
    caret.className = `caret ${hueClass(this.hue)}`;
    caret.setAttribute('aria-hidden', 'true');
    const flag = document.createElement('span');
    flag.textContent = this.name.split(' ')[0] ?? this.name;
    caret.append(flag);
    return caret;
  }

  override ignoreEvent(): boolean {
    return true;
  }
}

function decorate(view: EditorView, text: Y.Text, awareness: Awareness): DecorationSet {
  const ranges: Range<Decoration>[] = [];
  const length = view.state.doc.length;
  for (const [client, state] of awareness.getStates()) {
    if (client === awareness.clientID) continue;
    const { user, cursor } = state as Partial<Presence> & { cursor?: unknown };
    const place = placeIn(text, cursor);
    if (user === undefined || place === null) continue;
    const head = Math.min(place.head, length);
    const from = Math.min(place.anchor, head);
    const to = Math.min(Math.max(place.anchor, head), length);
    const hue = hueClass(user.hue);
    const line = view.state.doc.lineAt(head);
    ranges.push(Decoration.line({ class: `with-person ${hue}` }).range(line.from));
    if (from < to) ranges.push(Decoration.mark({ class: `sel-person ${hue}` }).range(from, to));
    ranges.push(
      Decoration.widget({
        widget: new CaretWidget(user.name, user.hue),
        side: head > place.anchor ? -1 : 1,
      }).range(head),
    );
  }
  return Decoration.set(ranges, true);
}

/** Shows co-authors' carets and selections in a text, and tells them of one's own while the editor has the focus. */
export function remoteCursors(text: Y.Text, awareness: Awareness): Extension {
  return ViewPlugin.fromClass(
    class {
      decorations: DecorationSet;

      constructor(private readonly view: EditorView) {
        this.decorations = decorate(view, text, awareness);
        awareness.on('change', this.onAwareness);
      }

      private readonly onAwareness = (change: {
        added: number[];
        updated: number[];
        removed: number[];
      }): void => {
        const others = [...change.added, ...change.updated, ...change.removed];
        if (others.some((client) => client !== awareness.clientID))
          this.view.dispatch({ effects: moved.of(null) });
      };

      update(update: ViewUpdate): void {
        const told = update.transactions.some((transaction) =>
          transaction.effects.some((effect) => effect.is(moved)),
        );
        if (update.docChanged || told) this.decorations = decorate(update.view, text, awareness);
        if (update.focusChanged || update.selectionSet || update.docChanged) this.tell(update.view);
      }

      private readonly own = new OwnCursor(awareness);

      private tell(view: EditorView): void {
        const { anchor, head } = view.state.selection.main;
        if (view.hasFocus) this.own.tell(text, { anchor, head });
        else this.own.forget();
      }

      destroy(): void {
        awareness.off('change', this.onAwareness);
        this.own.forget();
      }
    },
    { decorations: (plugin) => plugin.decorations },
  );
}
