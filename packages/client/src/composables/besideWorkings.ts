import { inject, type InjectionKey, provide } from 'vue';

const key: InjectionKey<true> = Symbol('beside the Workings');

/** Tells what stands below that its fair copies stand beside their Workings, in an open notebook. */
export const standBesideWorkings = (): void => provide(key, true);

/** Whether the calling component stands beside the Workings: there it is drawn anew while somebody types. */
export const isBesideWorkings = (): boolean => inject(key, null) === true;
