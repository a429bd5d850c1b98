import { computed, shallowReactive, type WritableComputedRef } from 'vue';

/** The complex chosen in each structure cell; shared by the outline in the Workings and the graph. */
const chosen = shallowReactive(new Map<string, number>());

/** The chosen complex of a cell; choosing it again lets it go. */
export function usePickedComplex(cell: () => string): WritableComputedRef<number | null> {
  return computed({
    get: () => chosen.get(cell()) ?? null,
    set(complex) {
      if (complex === null || chosen.get(cell()) === complex) chosen.delete(cell());
      else chosen.set(cell(), complex);
    },
  });
}
