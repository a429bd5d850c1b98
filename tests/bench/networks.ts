/** Numbers in [0, 1) that repeat: the generator of Park and Miller, 1988. */
function repeatable(seed: number): () => number {
  let state = seed;
  return () => (state = (state * 48271) % 2147483647) / 2147483647;
}

/**
 * A network text of random one-way reactions with one or two molecules a side; `bimolecular` is the share of sides with
 * two. The same for the same arguments.
 */
export function randomNetworkText(species: number, reactions: number, bimolecular: number, seed = 7): string {
  const random = repeatable(seed);
  const name = () => `S${Math.floor(random() * species)}`;
  const side = () => {
    const first = name();
    if (random() >= bimolecular) return first;
    const second = name();
    return first === second ? `2 ${first}` : `${first} + ${second}`;
  };
  const rows: string[] = [];
  while (rows.length < reactions) {
    const from = side();
    const to = side();
    if (from !== to) rows.push(`${from} -> ${to}`);
  }
  return rows.join('\n');
}

/** Hops between neighbours of a square lattice with periodic ends, as two family rows: 4·size² arrows. */
export function latticeText(size: number): string {
  const ranges = `[i = 1..${size}, j = 1..${size}]`;
  return `${ranges} X[i,j] <=> X[i % ${size} + 1,j] | p, q\n${ranges} X[i,j] <=> X[i,j % ${size} + 1] | p, q\n`;
}
