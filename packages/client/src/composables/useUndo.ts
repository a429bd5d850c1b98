import { cellsMap, origins } from '@stillroom/shared/document';
import { onScopeDispose, shallowRef, type ShallowRef, watch } from 'vue';
import * as Y from 'yjs';
import type { LiveRoom } from '../live/room.ts';

export interface Undo {
  readonly manager: Readonly<ShallowRef<Y.UndoManager | null>>;
  undo(): void;
  redo(): void;
}

/**
 * Taking back one's own changes, over the whole notebook: co-authors' changes bear the provider as origin and stay.
 * Editors add their own origin while they are mounted.
 */
export function useUndo(room: Readonly<{ value: LiveRoom | null }>): Undo {
  const manager = shallowRef<Y.UndoManager | null>(null);
  const release = () => {
    manager.value?.destroy();
    manager.value = null;
  };
  watch(
    () => room.value,
    (next) => {
      release();
      if (next !== null)
        manager.value = new Y.UndoManager(cellsMap(next.doc), {
          trackedOrigins: new Set([origins.author]),
          captureTimeout: 400,
        });
    },
    { immediate: true },
  );
  onScopeDispose(release);
  return { manager, undo: () => manager.value?.undo(), redo: () => manager.value?.redo() };
}
