import { reactive } from 'vue';

/** How a network is written: as text or row by row. */
export type NetworkView = 'text' | 'table';

/** What the reader chose for each network, for as long as the page is open. */
const chosen = reactive(new Map<string, NetworkView>());

/** On a phone a network is written row by row unless its text is asked for. */
export const networkViewOf = (cell: string, onPhone: boolean): NetworkView =>
  chosen.get(cell) ?? (onPhone ? 'table' : 'text');
export const chooseNetworkView = (cell: string, view: NetworkView): void => void chosen.set(cell, view);
