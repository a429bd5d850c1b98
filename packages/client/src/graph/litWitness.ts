import { computed, type ComputedRef, shallowRef } from 'vue';
import type { Light } from './lit.ts';

/** The witness that is lit: one at a time on the page. */
export interface LitWitness {
  /** The structure cell whose verdict it is of. */
  readonly cell: string;
  /** The network cell whose rows are lit with it. */
  readonly network: string | null;
  /** Tells the hypotheses of a cell apart. */
  readonly key: string;
  readonly light: Light;
  /** What is lit, for screen readers. */
  readonly words: string;
}

const lit = shallowRef<LitWitness | null>(null);

/** The lit witness of a structure cell, null where none of its own is. */
export const useLitWitness = (cell: () => string): ComputedRef<LitWitness | null> =>
  computed(() => (lit.value?.cell === cell() ? lit.value : null));

/** The rows of a network that a lit witness names. */
export const useLitRows = (network: () => string | undefined): ComputedRef<ReadonlySet<number> | null> =>
  computed(() =>
    lit.value !== null && lit.value.network !== null && lit.value.network === network()
      ? lit.value.light.rows
      : null,
  );

/** Lights a witness; the same once more puts it out. */
export function lightWitness(witness: LitWitness): void {
  lit.value = lit.value?.cell === witness.cell && lit.value.key === witness.key ? null : witness;
}

/** Puts out what a cell has lit. */
export function putOut(cell: string): void {
  if (lit.value?.cell === cell) lit.value = null;
}
