import { finish, GrowingInts, mix } from './growing.ts';

/**
 * Numbers names in the order in which they come: X, X[3], X[1,2] are a base and integer indices, and get their text only
 * when it is asked for. No string is made and no object kept per name, so that a lattice of a million sites costs a
 * few integers each.
 */
export class NameTable {
  private readonly bases = new Map<string, number>();
  private readonly baseNames: string[] = [];
  /** Number of the name without indices of each base, -1 where it has not come. */
  private readonly plain = new GrowingInts();
  private readonly baseOf = new GrowingInts();
  /** Indices of name i: `indices[offsets[i] .. offsets[i + 1])`. */
  private readonly offsets = new GrowingInts();
  private readonly indices = new GrowingInts();
  /** Open addressing: number + 1 of a name with indices, 0 for an empty slot; at most a quarter full. */
  private slots = new Int32Array(1024);
  private indexed = 0;

  constructor() {
    this.offsets.push(0);
  }

  get count(): number {
    return this.baseOf.length;
  }

  /** The number of a base, new or known. */
  base(name: string): number {
    const known = this.bases.get(name);
    if (known !== undefined) return known;
    this.bases.set(name, this.baseNames.length);
    this.baseNames.push(name);
    this.plain.push(-1);
    return this.baseNames.length - 1;
  }

  /** The number of a name, which is given one where it has none. Indices are 32-bit integers. */
  intern(base: number, indices: readonly number[]): number {
    if (indices.length === 0) {
      const known = this.plain.get(base);
      if (known >= 0) return known;
      this.plain.set(base, this.count);
      return this.add(base, indices);
    }
    if (this.indexed * 4 >= this.slots.length) this.grow();
    const slot = this.slotOf(base, indices);
    const known = this.slots[slot] as number;
    if (known > 0) return known - 1;
    this.slots[slot] = this.count + 1;
    this.indexed += 1;
    return this.add(base, indices);
  }

  /** The number of a name, -1 where it has not come. */
  find(name: string, indices: readonly number[]): number {
    const base = this.bases.get(name);
    if (base === undefined) return -1;
    if (indices.length === 0) return this.plain.get(base);
    return (this.slots[this.slotOf(base, indices)] as number) - 1;
  }

  /** "X" or "X[1,2]". */
  nameOf(number: number): string {
    const name = this.baseNames[this.baseOf.get(number)] ?? '';
    const from = this.offsets.get(number);
    const to = this.offsets.get(number + 1);
    if (from === to) return name;
    let text = `${name}[${this.indices.get(from)}`;
    for (let i = from + 1; i < to; i += 1) text += `,${this.indices.get(i)}`;
    return `${text}]`;
  }

  private add(base: number, indices: readonly number[]): number {
    this.baseOf.push(base);
    for (let i = 0; i < indices.length; i += 1) this.indices.push(indices[i] as number);
    this.offsets.push(this.indices.length);
    return this.count - 1;
  }

  /**
   * The slot that holds the name, or the empty one where it belongs. Sixteen neighbours in the last index share a hash and
   * stand side by side: families run along it, and so meet each cache line once.
   */
  private slotOf(base: number, indices: readonly number[]): number {
    const last = indices[indices.length - 1] as number;
    let hash = mix(base, last >> 4);
    for (let i = 0; i < indices.length - 1; i += 1) hash = mix(hash, indices[i] as number);
    const mask = this.slots.length - 1;
    let slot = ((finish(hash) << 4) | (last & 15)) & mask;
    for (;;) {
      const number = (this.slots[slot] as number) - 1;
      if (number < 0 || this.equals(number, base, indices)) return slot;
      slot = (slot + 1) & mask;
    }
  }

  private equals(number: number, base: number, indices: readonly number[]): boolean {
    if (this.baseOf.get(number) !== base) return false;
    const from = this.offsets.get(number);
    if (this.offsets.get(number + 1) - from !== indices.length) return false;
    for (let i = 0; i < indices.length; i += 1) if (this.indices.get(from + i) !== indices[i]) return false;
    return true;
  }

  private grow(): void {
    this.slots = new Int32Array(this.slots.length * 2);
    const indices: number[] = [];
    for (let number = 0; number < this.count; number += 1) {
      const from = this.offsets.get(number);
      const to = this.offsets.get(number + 1);
      if (from === to) continue;
      indices.length = 0;
      for (let i = from; i < to; i += 1) indices.push(this.indices.get(i));
      this.slots[this.slotOf(this.baseOf.get(number), indices)] = number + 1;
    }
  }
}
