export { createOperator } from './module.ts';
export type { QueueSource } from './queue-source.ts';
