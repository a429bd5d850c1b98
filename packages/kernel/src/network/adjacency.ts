/** Arrows grouped by complex: those of complex c are `arrows[offsets[c] .. offsets[c+1]-1]`, ascending. */
export interface Adjacency {
  readonly offsets: Int32Array;
  readonly arrows: Int32Array;
}

/** Groups the indices of `ends` by their value in 0 … count − 1, by counting; linear. */
export function adjacencyBy(ends: Int32Array, count: number): Adjacency {
  const offsets = new Int32Array(count + 1);
  for (let arrow = 0; arrow < ends.length; arrow++) offsets[ends[arrow]! + 1]!++;
  for (let group = 0; group < count; group++) offsets[group + 1]! += offsets[group]!;
  const next = offsets.slice(0, count);
  const arrows = new Int32Array(ends.length);
  for (let arrow = 0; arrow < ends.length; arrow++) arrows[next[ends[arrow]!]!++] = arrow;
  return { offsets, arrows };
}
