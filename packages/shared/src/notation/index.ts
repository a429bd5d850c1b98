export type { NetworkTree } from './ast.ts';
export type { Complaint, NotationReading, Repair } from './complaint.ts';
export { parseNetwork } from './parse.ts';
export { canonicalText, printNetwork } from './print.ts';
export { readNetwork } from './read.ts';
