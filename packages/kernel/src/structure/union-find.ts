/** Disjoint sets of 0 … size − 1 with path halving and union by size (Tarjan 1975). */
export class UnionFind {
  readonly #parent: Int32Array;
  readonly #size: Int32Array;

  constructor(size: number) {
    this.#parent = Int32Array.from({ length: size }, (_, item) => item);
    this.#size = new Int32Array(size).fill(1);
  }

  /** The representative of the set of an item. */
  find(item: number): number {
    const parent = this.#parent;
    let at = item;
    while (parent[at] !== at) {
      parent[at] = parent[parent[at]!]!;
      at = parent[at]!;
    }
    return at;
  }

  /** Joins the sets of two items; false when they were one set already. */
  union(a: number, b: number): boolean {
    let big = this.find(a);
    let small = this.find(b);
    if (big === small) return false;
    if (this.#size[big]! < this.#size[small]!) [big, small] = [small, big];
    this.#parent[small] = big;
    this.#size[big]! += this.#size[small]!;
    return true;
  }

  /** The representative of every item. */
  labels(): Int32Array {
    return this.#parent.map((_, item) => this.find(item));
  }
}
