export { ByteWriter } from './byte-writer.ts';
export { instruction, valueType } from './instructions.ts';
export type { ValueType } from './instructions.ts';
export { ModuleBuilder } from './module-builder.ts';
export type { FunctionIndex } from './module-builder.ts';
