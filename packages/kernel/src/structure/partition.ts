/**
 * Items 0 … n − 1 in disjoint classes. Classes stand in the order of their first item, items ascend within a class:
 * those of class c are `members[offsets[c] .. offsets[c+1]-1]`.
 */
export interface Partition {
  readonly count: number;
  /** Class of each item. */
  readonly of: Int32Array;
  readonly offsets: Int32Array;
  readonly members: Int32Array;
}

/** The partition in which two items share a class when they have the same label (labels lie in 0 … n − 1). */
export function partitionByLabel(labels: Int32Array): Partition {
  const size = labels.length;
  const renumbered = new Int32Array(size).fill(-1);
  const of = new Int32Array(size);
  let count = 0;
  for (let item = 0; item < size; item++) {
    const label = labels[item]!;
    if (renumbered[label]! < 0) renumbered[label] = count++;
    of[item] = renumbered[label]!;
  }
  const offsets = new Int32Array(count + 1);
  for (let item = 0; item < size; item++) offsets[of[item]! + 1]!++;
  for (let group = 0; group < count; group++) offsets[group + 1]! += offsets[group]!;
  const next = offsets.slice(0, count);
  const members = new Int32Array(size);
  for (let item = 0; item < size; item++) members[next[of[item]!]!++] = item;
  return { count, of, offsets, members };
}

/** The items of one class, ascending. */
export function membersOf(partition: Partition, group: number): Int32Array {
  return partition.members.subarray(partition.offsets[group]!, partition.offsets[group + 1]!);
}
