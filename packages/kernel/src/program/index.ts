export { assemble } from './assembly.ts';
export type { Assembly, Backend, Call, Routine, RunRoutine } from './assembly.ts';
export { gradient, nodesAbove } from './derivative.ts';
export { Graph, spaces } from './graph.ts';
export type { Node, Space } from './graph.ts';
export { hostNumber } from './host-functions.ts';
export { makeTape, makeTapes, readsSlot } from './tape.ts';
export type { Output, Tape } from './tape.ts';
