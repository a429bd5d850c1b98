export { createOperator } from './module.ts';
export type { QueueSource } from './module.ts';
