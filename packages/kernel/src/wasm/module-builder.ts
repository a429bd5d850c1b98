import { ByteWriter } from './byte-writer.ts';
import { instruction, type ValueType } from './instructions.ts';

/** A function number: imported functions first, then defined ones, as the format counts them. */
export type FunctionIndex = number;

interface Definition {
  readonly type: number;
  readonly locals: readonly { readonly count: number; readonly type: ValueType }[];
  readonly body: ByteWriter;
}

const section = { type: 1, import: 2, function: 3, export: 7, code: 10 } as const;
const external = { function: 0, memory: 2 } as const;

/**
 * Builds one WebAssembly module with an imported memory ("engine" "memory"). Import every function before the first
 * `define`: indices of defined functions begin after the imports.
 */
export class ModuleBuilder {
  private readonly types: string[] = [];
  private readonly typeBytes: ByteWriter[] = [];
  private readonly imports: { name: string; type: number }[] = [];
  private readonly definitions: Definition[] = [];
  private readonly exports: { name: string; index: FunctionIndex }[] = [];

  importFunction(
    name: string,
    parameters: readonly ValueType[],
    results: readonly ValueType[],
  ): FunctionIndex {
    if (this.definitions.length > 0) throw new Error('Functions are imported before any is defined.');
    this.imports.push({ name, type: this.typeIndex(parameters, results) });
    return this.imports.length - 1;
  }

  /** `body` holds the instructions without the closing `end`. */
  define(
    parameters: readonly ValueType[],
    results: readonly ValueType[],
    locals: Definition['locals'],
    body: ByteWriter,
  ): FunctionIndex {
    this.definitions.push({ type: this.typeIndex(parameters, results), locals, body });
    return this.imports.length + this.definitions.length - 1;
  }

  export(name: string, index: FunctionIndex): void {
    this.exports.push({ name, index });
  }

  /** The module's bytes; `pages` is the least size of the imported memory in units of 64 KiB. */
  finish(pages: number): Uint8Array<ArrayBuffer> {
    const out = new ByteWriter(1024);
    for (const byte of [0x00, 0x61, 0x73, 0x6d, 1, 0, 0, 0]) out.byte(byte);
    this.section(out, section.type, this.typeBytes.length, (part) => {
      for (const bytes of this.typeBytes) part.append(bytes);
    });
    this.section(out, section.import, this.imports.length + 1, (part) => {
      part.name('engine');
      part.name('memory');
      part.byte(external.memory);
      part.byte(0);
      part.unsigned(pages);
      for (const { name, type } of this.imports) {
        part.name('engine');
        part.name(name);
        part.byte(external.function);
        part.unsigned(type);
      }
    });
    this.section(out, section.function, this.definitions.length, (part) => {
      for (const { type } of this.definitions) part.unsigned(type);
    });
    this.section(out, section.export, this.exports.length, (part) => {
      for (const { name, index } of this.exports) {
        part.name(name);
        part.byte(external.function);
        part.unsigned(index);
      }
    });
    this.section(out, section.code, this.definitions.length, (part) => {
      for (const { locals, body } of this.definitions) {
        const head = new ByteWriter(16);
        head.unsigned(locals.length);
        for (const { count, type } of locals) {
          head.unsigned(count);
          head.byte(type);
        }
        part.unsigned(head.length + body.length + 1);
        part.append(head);
        part.append(body);
        part.byte(instruction.end);
      }
    });
    return out.finish();
  }

  private section(out: ByteWriter, id: number, count: number, write: (part: ByteWriter) => void): void {
    const part = new ByteWriter(1024);
    part.unsigned(count);
    write(part);
    out.byte(id);
    out.sized(part);
  }

  private typeIndex(parameters: readonly ValueType[], results: readonly ValueType[]): number {
    const key = `${parameters.join()}>${results.join()}`;
    const known = this.types.indexOf(key);
    if (known >= 0) return known;
    const bytes = new ByteWriter(8);
    bytes.byte(0x60);
    for (const list of [parameters, results]) {
      bytes.unsigned(list.length);
      for (const type of list) bytes.byte(type);
    }
    this.typeBytes.push(bytes);
    return this.types.push(key) - 1;
  }
}
