import type { Presence } from '@stillroom/shared/protocol';
import { computed, type ComputedRef, onScopeDispose, shallowRef, watch } from 'vue';
import type { LiveRoom } from '../live/room.ts';

/** A person at the notebook; one entry a person, however many windows. */
export interface PersonHere {
  readonly id: string;
  readonly name: string;
  readonly initials: string;
  readonly hue: number;
  readonly you: boolean;
  /** Cells this person is in. */
  readonly cells: readonly string[];
}

export interface PresenceHere {
  readonly people: ComputedRef<readonly PersonHere[]>;
  /** People other than you in each cell. */
  readonly inCell: ComputedRef<ReadonlyMap<string, readonly PersonHere[]>>;
  /** Tells the others which cell you are in. */
  moveTo(cell: string | null): void;
}

/** Checks what another page claims about itself: awareness comes from other people's machines. */
function readPresence(state: unknown): Presence | null {
  if (typeof state !== 'object' || state === null) return null;
  const { user, cell } = state as Partial<Presence>;
  if (typeof user?.id !== 'string' || typeof user.name !== 'string') return null;
  if (typeof user.initials !== 'string' || typeof user.hue !== 'number') return null;
  return { user, cell: typeof cell === 'string' ? cell : null };
}

/** Who is at the notebook and where; `me` is what the others see of you. */
export function usePresence(
  room: Readonly<{ value: LiveRoom | null }>,
  me: () => Presence['user'] | null,
): PresenceHere {
  const states = shallowRef<readonly Presence[]>([]);
  let here: string | null = null;
  let release: () => void = () => undefined;

  watch(
    () => room.value,
    (next) => {
      release();
      release = () => undefined;
      if (next === null) return;
      const { awareness } = next;
      let said = '';
      const read = () => {
        const now = [...awareness.getStates().values()].flatMap((state) => readPresence(state) ?? []);
        // With every key a cursor moves; who is here, and where, mostly stays.
        const says = JSON.stringify(now);
        if (says === said) return;
        said = says;
        states.value = now;
      };
      const user = me();
      if (user !== null) awareness.setLocalState({ user, cell: here });
      read();
      awareness.on('change', read);
      release = () => awareness.off('change', read);
    },
    { immediate: true },
  );
  onScopeDispose(() => release());

  const people = computed(() => {
    const byPerson = new Map<string, PersonHere>();
    const mine = me()?.id;
    for (const { user, cell } of states.value) {
      const known = byPerson.get(user.id);
      const cells = [...(known?.cells ?? []), ...(cell === null ? [] : [cell])];
      byPerson.set(user.id, { ...user, you: user.id === mine, cells });
    }
    return [...byPerson.values()].sort(
      (a, b) => Number(a.you) - Number(b.you) || a.name.localeCompare(b.name),
    );
  });

  const inCell = computed(() => {
    const cells = new Map<string, PersonHere[]>();
    for (const person of people.value)
      if (!person.you) for (const cell of person.cells) cells.set(cell, [...(cells.get(cell) ?? []), person]);
    return cells;
  });

  return {
    people,
    inCell,
    moveTo(cell) {
      here = cell;
      room.value?.awareness.setLocalStateField('cell', cell);
    },
  };
}
