/**
 * A graph of floating-point operations with shared subexpressions. It is the one description from which both the
 * interpreter and the WebAssembly emitter work, so both do the same operations in the same order and give the same
 * bits. Operands always have smaller numbers than the node that uses them.
 */

/** The operations; comparisons give 1 or 0, `select` takes its second operand when the first is not 0. */
export const operations = {
  constant: 0,
  load: 1,
  add: 2,
  subtract: 3,
  multiply: 4,
  divide: 5,
  negate: 6,
  abs: 7,
  sqrt: 8,
  min: 9,
  max: 10,
  floor: 11,
  ceil: 12,
  less: 13,
  lessEqual: 14,
  equal: 15,
  select: 16,
  call: 17,
} as const;

/** How many operands each operation has, by its number. */
export const operandCounts: readonly number[] = [0, 0, 2, 2, 2, 2, 1, 1, 1, 2, 2, 1, 1, 2, 2, 2, 3, 2];

/**
 * Where a slot lies: at a fixed place of the memory, or counted from the first or the second base with which a
 * routine is called.
 */
export const spaces = { fixed: 0, first: 1, second: 2 } as const;
export type Space = (typeof spaces)[keyof typeof spaces];

/** Nodes are numbers into the graph that made them. */
export type Node = number;

/** More operations than this are refused: programs of that length cannot be compiled in useful time. */
const mostNodes = 2 ** 23;
const smallestTable = 128;

export class Graph {
  readonly operation: number[] = [];
  /** Operands, or for loads the slot and the space; for constants `left` is a place among the numbers. */
  readonly left: number[] = [];
  readonly right: number[] = [];
  readonly third: number[] = [];
  private readonly numbers: number[] = [];
  private readonly constants = new Map<number, Node>();
  /** Nodes by a hash of what they are, plus 1; open addressing, its length a power of two and at least twice the nodes. */
  private table = new Int32Array(smallestTable);

  /** How many nodes there are. */
  get size(): number {
    return this.operation.length;
  }

  constant(value: number): Node {
    const known = this.constants.get(value);
    if (known !== undefined) return known;
    const node = this.append(operations.constant, this.numbers.push(value) - 1, 0, 0);
    this.constants.set(value, node);
    return node;
  }

  /** The number at a slot, read before the routine writes anything. */
  load(slot: number, space: Space = spaces.fixed): Node {
    return this.pair(operations.load, slot, space);
  }

  add(a: Node, b: Node): Node {
    const { operation } = this;
    if (operation[a] === operations.constant || operation[b] === operations.constant) {
      if (this.isConstant(a, 0)) return b;
      if (this.isConstant(b, 0)) return a;
      if (this.bothConstant(a, b)) return this.constant(this.value(a) + this.value(b));
    }
    return a < b ? this.triple(operations.add, a, b, 0) : this.triple(operations.add, b, a, 0);
  }

  subtract(a: Node, b: Node): Node {
    const { operation } = this;
    if (operation[a] === operations.constant || operation[b] === operations.constant) {
      if (this.isConstant(b, 0)) return a;
      if (this.isConstant(a, 0)) return this.negate(b);
      if (this.bothConstant(a, b)) return this.constant(this.value(a) - this.value(b));
    }
    return this.triple(operations.subtract, a, b, 0);
  }

  multiply(a: Node, b: Node): Node {
    const { operation } = this;
    if (operation[a] === operations.constant || operation[b] === operations.constant) {
      if (this.isConstant(a, 0) || this.isConstant(b, 0)) return this.constant(0);
      if (this.isConstant(a, 1)) return b;
      if (this.isConstant(b, 1)) return a;
      if (this.isConstant(a, -1)) return this.negate(b);
      if (this.isConstant(b, -1)) return this.negate(a);
      if (this.bothConstant(a, b)) return this.constant(this.value(a) * this.value(b));
    }
    return a < b ? this.triple(operations.multiply, a, b, 0) : this.triple(operations.multiply, b, a, 0);
  }

  divide(a: Node, b: Node): Node {
    if (this.isConstant(b, 1)) return a;
    if (this.bothConstant(a, b)) return this.constant(this.value(a) / this.value(b));
    return this.pair(operations.divide, a, b);
  }

  negate(a: Node): Node {
    if (this.isConstantNode(a)) return this.constant(-this.value(a));
    if (this.operation[a] === operations.negate) return this.left[a]!;
    return this.pair(operations.negate, a, 0);
  }

  abs(a: Node): Node {
    return this.pair(operations.abs, a, 0);
  }

  sqrt(a: Node): Node {
    return this.pair(operations.sqrt, a, 0);
  }

  min(a: Node, b: Node): Node {
    return this.pair(operations.min, a, b);
  }

  max(a: Node, b: Node): Node {
    return this.pair(operations.max, a, b);
  }

  floor(a: Node): Node {
    return this.pair(operations.floor, a, 0);
  }

  ceil(a: Node): Node {
    return this.pair(operations.ceil, a, 0);
  }

  less(a: Node, b: Node): Node {
    return this.pair(operations.less, a, b);
  }

  lessEqual(a: Node, b: Node): Node {
    return this.pair(operations.lessEqual, a, b);
  }

  equal(a: Node, b: Node): Node {
    return this.pair(operations.equal, a, b);
  }

  /** `whenTrue` where `condition` is not 0, else `whenFalse`; both are computed. */
  select(condition: Node, whenTrue: Node, whenFalse: Node): Node {
    if (whenTrue === whenFalse) return whenTrue;
    return this.triple(operations.select, condition, whenTrue, whenFalse);
  }

  /** A call of host function number `host` of the table in host-functions.ts; `b` is ignored by functions of one argument. */
  call(host: number, a: Node, b: Node = a): Node {
    return this.triple(operations.call, a, b, host);
  }

  /** The number of a constant node. */
  value(node: Node): number {
    return this.numbers[this.left[node]!]!;
  }

  /** The slot of a node that loads from `space`, else -1. */
  slot(node: Node, space: Space): number {
    return this.operation[node] === operations.load && this.right[node] === space ? this.left[node]! : -1;
  }

  isConstantNode(node: Node): boolean {
    return this.operation[node] === operations.constant;
  }

  isConstant(node: Node, value: number): boolean {
    return this.isConstantNode(node) && this.value(node) === value;
  }

  private bothConstant(a: Node, b: Node): boolean {
    return this.isConstantNode(a) && this.isConstantNode(b);
  }

  private pair(operation: number, a: number, b: number): Node {
    return this.triple(operation, a, b, 0);
  }

  /** The node of this description: the known one where there is one. */
  private triple(operation: number, a: number, b: number, c: number): Node {
    const { table } = this;
    const mask = table.length - 1;
    let place = hash(operation, a, b, c) & mask;
    for (let entry = table[place]!; entry !== 0; entry = table[place]!) {
      const node = entry - 1;
      if (
        this.left[node] === a &&
        this.right[node] === b &&
        this.operation[node] === operation &&
        this.third[node] === c
      )
        return node;
      place = (place + 1) & mask;
    }
    const node = this.append(operation, a, b, c);
    table[place] = node + 1;
    if (this.size * 2 > table.length) this.growTable();
    return node;
  }

  private growTable(): void {
    const table = new Int32Array(this.table.length * 4);
    const mask = table.length - 1;
    for (let node = 0; node < this.size; node++) {
      const operation = this.operation[node]!;
      if (operation === operations.constant) continue;
      let place = hash(operation, this.left[node]!, this.right[node]!, this.third[node]!) & mask;
      while (table[place] !== 0) place = (place + 1) & mask;
      table[place] = node + 1;
    }
    this.table = table;
  }

  private append(operation: number, a: number, b: number, c: number): Node {
    const node = this.operation.length;
    if (node >= mostNodes) throw new RangeError(`The rate equations need more than ${mostNodes} operations.`);
    this.operation.push(operation);
    this.left.push(a);
    this.right.push(b);
    this.third.push(c);
    return node;
  }
}

/** A hash of four whole numbers (multiplication by odd constants, high bits mixed into low ones). */
function hash(operation: number, a: number, b: number, c: number): number {
  let h = Math.imul(a, 0x9e3779b1) ^ Math.imul(b, 0x85ebca6b);
  h = Math.imul(h ^ (h >>> 15) ^ c, 0xc2b2ae35) ^ Math.imul(operation, 0x27d4eb2f);
  return h ^ (h >>> 13);
}

/** The operand nodes of a node, in order; constants and loads have none. */
export function operands(graph: Graph, node: Node): readonly Node[] {
  const count = operandCounts[graph.operation[node]!]!;
  const all = [graph.left[node]!, graph.right[node]!, graph.third[node]!];
  return all.slice(0, count);
}
