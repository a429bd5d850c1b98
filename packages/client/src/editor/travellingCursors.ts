import type { Awareness } from 'y-protocols/awareness';
import * as Y from 'yjs';

/** Where a person's cursor is, as it travels: Yjs relative positions as JSON. */
interface TravellingCursor {
  readonly anchor: unknown;
  readonly head: unknown;
}

/** The two ends of a selection, as offsets in a text; `head` is where the caret stands. */
export interface Place {
  readonly anchor: number;
  readonly head: number;
}

const isObject = (value: unknown): value is object => typeof value === 'object' && value !== null;

/** A place in a text as co-authors are told of it: it stays where it is while others type. */
const cursorAt = (text: Y.Text, { anchor, head }: Place): TravellingCursor => ({
  anchor: Y.relativePositionToJSON(Y.createRelativePositionFromTypeIndex(text, anchor)),
  head: Y.relativePositionToJSON(Y.createRelativePositionFromTypeIndex(text, head)),
});

/** Where a cursor that came from elsewhere stands in a text; null where it is in none or in another. */
export function placeIn(text: Y.Text, cursor: unknown): Place | null {
  const { anchor, head } = (cursor ?? {}) as Partial<TravellingCursor>;
  if (text.doc === null || !isObject(anchor) || !isObject(head)) return null;
  const at = (position: unknown): number | null => {
    const found = Y.createAbsolutePositionFromRelativePosition(
      Y.createRelativePositionFromJSON(position),
      text.doc as Y.Doc,
    );
    return found !== null && found.type === text ? found.index : null;
  };
  const from = at(anchor);
  const to = at(head);
  return from === null || to === null ? null : { anchor: from, head: to };
}

/** One's own cursor as one editor tells of it. Going from one editor into another, the first takes back only its own. */
export class OwnCursor {
  private readonly awareness: Awareness;
  private told: TravellingCursor | null = null;

  constructor(awareness: Awareness) {
    this.awareness = awareness;
  }

  tell(text: Y.Text, place: Place): void {
    this.told = cursorAt(text, place);
    this.awareness.setLocalStateField('cursor', this.told);
  }

  forget(): void {
    if (this.told !== null && this.awareness.getLocalState()?.['cursor'] === this.told)
      this.awareness.setLocalStateField('cursor', null);
    this.told = null;
  }
}
