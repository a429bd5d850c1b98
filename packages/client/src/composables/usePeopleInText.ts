import { cellText } from '@stillroom/shared/document';
import type { Presence } from '@stillroom/shared/protocol';
import { computed, type ComputedRef, onScopeDispose, shallowRef, watch } from 'vue';
import { type Place, placeIn } from '../editor/travellingCursors.ts';
import { useNotebook } from './useNotebook.ts';

/** A co-author whose caret stands in the text of a cell. */
export interface PersonInText extends Place {
  /** One for each window. */
  readonly client: number;
  readonly name: string;
  readonly hue: number;
}

/** The co-authors whose carets stand in the text of a cell, where that is shown without an editor. */
export function usePeopleInText(cell: () => string): ComputedRef<readonly PersonInText[]> {
  const notebook = useNotebook();
  const people = shallowRef<readonly PersonInText[]>([]);
  let release: () => void = () => undefined;

  watch(
    [notebook.live.room, cell],
    ([room]) => {
      release();
      release = () => undefined;
      people.value = [];
      const text = room === null ? undefined : cellText(room.doc, cell());
      if (room === null || text === undefined) return;
      const { awareness } = room;
      const read = (): void => {
        const found: PersonInText[] = [];
        for (const [client, state] of awareness.getStates()) {
          const { user, cursor } = state as Partial<Presence> & { cursor?: unknown };
          if (client === awareness.clientID || typeof user?.name !== 'string' || !cursor) continue;
          const place = placeIn(text, cursor);
          if (place !== null) found.push({ client, name: user.name, hue: Number(user.hue) || 0, ...place });
        }
        if (found.length > 0 || people.value.length > 0) people.value = found;
      };
      read();
      awareness.on('change', read);
      text.observe(read);
      release = () => {
        awareness.off('change', read);
        text.unobserve(read);
      };
    },
    { immediate: true },
  );
  onScopeDispose(() => release());
  return computed(() => people.value);
}
