import { reactive } from 'vue';

/** How a network is written: as text or row by row. */
export type NetworkView = 'text' | 'table';

/** What the reader chose for each network, for as long as the page is open. */
const chosen = reactive(new Map<string, NetworkView>());

export const networkViewOf = (cell: string): NetworkView => chosen.get(cell) ?? 'text';
export const chooseNetworkView = (cell: string, view: NetworkView): void => void chosen.set(cell, view);
