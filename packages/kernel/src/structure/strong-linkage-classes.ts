import type { StructuralNetwork } from '../network/index.ts';
import type { Partition } from './partition.ts';
import { partitionByLabel } from './partition.ts';

/**
 * Strong linkage classes: strongly connected components of the graph of complexes (Tarjan 1972, with an explicit stack
 * so that chains of any length are safe). Linear.
 */
export function strongLinkageClasses(network: StructuralNetwork): Partition {
  const size = network.complexes.count;
  const { offsets, arrows } = network.outgoing;
  const { to } = network.arrows;
  const found = new Int32Array(size).fill(-1);
  const low = new Int32Array(size);
  const label = new Int32Array(size).fill(-1);
  const next = offsets.slice(0, size);
  const path = new Int32Array(size);
  const open = new Int32Array(size);
  let openCount = 0;
  let time = 0;
  for (let root = 0; root < size; root++) {
    if (found[root]! >= 0) continue;
    let depth = 0;
    path[0] = root;
    found[root] = low[root] = time++;
    open[openCount++] = root;
    while (depth >= 0) {
      const at = path[depth]!;
      if (next[at]! < offsets[at + 1]!) {
        const target = to[arrows[next[at]!++]!]!;
        if (found[target]! < 0) {
          path[++depth] = target;
          found[target] = low[target] = time++;
          open[openCount++] = target;
        } else if (label[target]! < 0 && found[target]! < low[at]!) {
          low[at] = found[target]!;
        }
        continue;
      }
      if (low[at] === found[at]) {
        let member: number;
        do {
          member = open[--openCount]!;
          label[member] = at;
        } while (member !== at);
      }
      depth--;
      if (depth >= 0 && low[at]! < low[path[depth]!]!) low[path[depth]!] = low[at]!;
    }
  }
  return partitionByLabel(label);
}

/** For each strong linkage class 1 where it is terminal: no arrow leaves it. */
export function terminalFlags(network: StructuralNetwork, strong: Partition): Uint8Array {
  const { from, to, count } = network.arrows;
  const terminal = new Uint8Array(strong.count).fill(1);
  for (let arrow = 0; arrow < count; arrow++) {
    const leaves = strong.of[from[arrow]!]!;
    if (leaves !== strong.of[to[arrow]!]!) terminal[leaves] = 0;
  }
  return terminal;
}

/** Complexes outside terminal strong linkage classes, ascending. */
export function nonterminalComplexes(strong: Partition, terminal: Uint8Array): Int32Array {
  const outside = new Int32Array(strong.of.length);
  let end = 0;
  for (let complex = 0; complex < strong.of.length; complex++) {
    if (terminal[strong.of[complex]!] === 0) outside[end++] = complex;
  }
  return outside.subarray(0, end);
}
