export { createShelf } from './module.ts';
