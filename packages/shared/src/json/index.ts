export { locateJsonFault } from './locate.ts';
export type { JsonFault } from './locate.ts';
export { readJson } from './parse.ts';
export type { JsonReading } from './parse.ts';
