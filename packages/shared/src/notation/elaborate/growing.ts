/** A list of 32-bit integers that grows by doubling. */
export class GrowingInts {
  length = 0;
  private items = new Int32Array(64);

  push(value: number): void {
    if (this.length === this.items.length) this.items = grownInts(this.items);
    this.items[this.length] = value;
    this.length += 1;
  }

  get(index: number): number {
    return this.items[index] as number;
  }

  set(index: number, value: number): void {
    this.items[index] = value;
  }

  /** A copy of exactly the items. */
  toArray(): Int32Array {
    return this.items.slice(0, this.length);
  }
}

/** A list of doubles that grows by doubling. */
export class GrowingNumbers {
  length = 0;
  private items = new Float64Array(64);

  push(value: number): void {
    if (this.length === this.items.length) {
      const larger = new Float64Array(this.items.length * 2);
      larger.set(this.items);
      this.items = larger;
    }
    this.items[this.length] = value;
    this.length += 1;
  }

  get(index: number): number {
    return this.items[index] as number;
  }

  toArray(): Float64Array {
    return this.items.slice(0, this.length);
  }
}

function grownInts(items: Int32Array): Int32Array<ArrayBuffer> {
  const larger = new Int32Array(items.length * 2);
  larger.set(items);
  return larger;
}

/** Mixes an integer into a hash (the 32-bit step of MurmurHash3, Appleby 2011). */
export function mix(hash: number, value: number): number {
  let k = Math.imul(value, 0xcc9e2d51);
  k = (k << 15) | (k >>> 17);
  let h = hash ^ Math.imul(k, 0x1b873593);
  h = (h << 13) | (h >>> 19);
  return (Math.imul(h, 5) + 0xe6546b64) | 0;
}

/** The last step of the hash: lets every bit of it act on the low ones. */
export function finish(hash: number): number {
  let h = hash ^ (hash >>> 16);
  h = Math.imul(h, 0x85ebca6b);
  h ^= h >>> 13;
  return h >>> 0;
}
