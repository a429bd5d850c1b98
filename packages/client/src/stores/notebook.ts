import { defineStore } from 'pinia';
import { computed, ref } from 'vue';

/** How one person likes one notebook to lie open; kept on this machine. */
interface Lying {
  /** Workings' part of the book in hundredths; null until the person has moved the seam. */
  seam: number | null;
  folded: readonly string[];
  /** Cells whose Workings are put away, or all of them. */
  workingsAway: readonly string[];
}

export const seamBounds = { least: 30, most: 60, usual: 42, wideFair: 36, step: 2 } as const;

const usual: Lying = { seam: null, folded: [], workingsAway: [] };

function read(key: string): Lying {
  try {
    const kept: unknown = JSON.parse(localStorage.getItem(key) ?? 'null');
    return { ...usual, ...(typeof kept === 'object' ? kept : {}) };
  } catch {
    return usual;
  }
}

const toggled = (list: readonly string[], id: string) =>
  list.includes(id) ? list.filter((other) => other !== id) : [...list, id];

/** How the open notebook lies on the desk: where the seam stands, what is folded, which page shows when only one can. */
export const useLying = defineStore('lying', () => {
  let key = '';
  const lying = ref<Lying>(usual);
  /** Whether something in the notebook needs a wide fair copy, such as a graph of many complexes. */
  const wide = ref(false);
  /** Which page shows where there is room for one only. */
  const page = ref<'workings' | 'fair'>('fair');

  function open(person: string, notebook: string): void {
    key = `stillroom.lying.${person}.${notebook}`;
    lying.value = read(key);
    wide.value = false;
  }

  function keep(change: Partial<Lying>): void {
    lying.value = { ...lying.value, ...change };
    localStorage.setItem(key, JSON.stringify(lying.value));
  }

  return {
    page,
    open,
    seam: computed(() => lying.value.seam ?? (wide.value ? seamBounds.wideFair : seamBounds.usual)),
    /** Gives the fair copy more room, unless the person has moved the seam. */
    widenFair: () => (wide.value = true),
    moveSeam: (to: number) =>
      keep({ seam: Math.min(seamBounds.most, Math.max(seamBounds.least, Math.round(to))) }),
    isFolded: (id: string) => lying.value.folded.includes(id),
    fold: (id: string) => keep({ folded: toggled(lying.value.folded, id) }),
    isAway: (id: string) => lying.value.workingsAway.includes(id),
    putAway: (id: string) => keep({ workingsAway: toggled(lying.value.workingsAway, id) }),
  };
});
