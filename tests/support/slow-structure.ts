import type { Network } from '@stillroom/shared/network';

/*
 * An independent referee for the structure of small networks: definitions spelt out over fractions, subsets enumerated,
 * nothing shared with the engine. Exponential; for about seven species and eight arrows.
 */

interface Fraction {
  readonly top: bigint;
  readonly bottom: bigint;
}

const fraction = (top: bigint, bottom: bigint): Fraction => {
  let [a, b] = [top < 0n ? -top : top, bottom < 0n ? -bottom : bottom];
  while (b !== 0n) [a, b] = [b, a % b];
  const common = (a === 0n ? 1n : a) * (bottom < 0n ? -1n : 1n);
  return { top: top / common, bottom: bottom / common };
};
const minus = (a: Fraction, b: Fraction) =>
  fraction(a.top * b.bottom - b.top * a.bottom, a.bottom * b.bottom);
const times = (a: Fraction, b: Fraction) => fraction(a.top * b.top, a.bottom * b.bottom);
const over = (a: Fraction, b: Fraction) => fraction(a.top * b.bottom, a.bottom * b.top);

/** Everything the definitions of structure say about a network without fixed species. */
export interface SlowStructure {
  readonly complexes: readonly string[];
  readonly arrows: readonly string[];
  readonly linkageClasses: number;
  readonly strongClasses: number;
  readonly terminalClasses: number;
  readonly rank: number;
  readonly classRanks: readonly number[];
  readonly reversible: boolean;
  /** Supports with the one law they carry, as "A:1,B:2". */
  readonly extremeLaws: readonly string[];
  readonly conservative: boolean;
  readonly consistent: boolean;
  readonly minimalSiphons: readonly string[];
  readonly criticalSiphons: readonly string[];
}

/** Applies the definitions. Labels sort terms by name so that the order of species does not matter. */
export function slowStructure(network: Network): SlowStructure {
  const contents = Array.from({ length: network.complexes.count }, (_, y) => contentOf(network, y));
  const labels = contents.map(labelOf);
  const arrows = new Map<string, [number, number]>();
  for (let r = 0; r < network.reactions.count; r++) {
    const [from, to] = [network.reactions.from[r]!, network.reactions.to[r]!];
    arrows.set(`${labels[from]} -> ${labels[to]}`, [from, to]);
  }
  const pairs = [...arrows.values()];
  const used = [...new Set(pairs.flat())];
  const columns = pairs.map(([from, to]) =>
    network.species.map((name) => minus(at(contents[to]!, name), at(contents[from]!, name))),
  );
  const reach = closure(used, pairs);
  const linked = closure(
    used,
    pairs.flatMap(([a, b]): [number, number][] => [
      [a, b],
      [b, a],
    ]),
  );
  const linkage = groups(used, (a, b) => linked.has(`${a},${b}`));
  const strong = groups(used, (a, b) => reach.has(`${a},${b}`) && reach.has(`${b},${a}`));
  const terminal = strong.filter((group) =>
    pairs.every(([from, to]) => !group.includes(from) || group.includes(to)),
  );
  const laws = positiveKernelVectors(network.species.length, columns);
  const fluxes = positiveKernelVectors(
    columns.length,
    network.species.map((_, i) => columns.map((column) => column[i]!)),
  );
  const siphons = minimalSets(network.species.length, (set) =>
    pairs.every(
      ([from, to]) =>
        !touches(contents[to]!, set, network.species) || touches(contents[from]!, set, network.species),
    ),
  );
  const names = (set: readonly number[]) =>
    set
      .map((i) => network.species[i]!)
      .sort()
      .join(',');
  const supports = laws.map((law) => law.flatMap((value, i) => (value.top === 0n ? [] : [i])));
  return {
    complexes: used.map((y) => labels[y]!).sort(),
    arrows: [...arrows.keys()].sort(),
    linkageClasses: linkage.length,
    strongClasses: strong.length,
    terminalClasses: terminal.length,
    rank: rank(columns),
    classRanks: linkage
      .map((group) => rank(columns.filter((_, j) => group.includes(pairs[j]![0]))))
      .sort((a, b) => a - b),
    reversible: pairs.every(([from, to]) => pairs.some(([a, b]) => a === to && b === from)),
    extremeLaws: laws.map((law) => primitiveText(law, network.species)).sort(),
    conservative: network.species.every((_, i) => laws.some((law) => law[i]!.top !== 0n)),
    consistent: columns.every((_, j) => fluxes.some((flux) => flux[j]!.top !== 0n)),
    minimalSiphons: siphons.map(names).sort(),
    criticalSiphons: siphons
      .filter((set) => !supports.some((support) => support.every((i) => set.includes(i))))
      .map(names)
      .sort(),
  };
}

/** "A:1,B:2" with coprime positive integers, names sorted. */
export function primitiveText(law: readonly Fraction[], species: readonly string[]): string {
  const common = law.reduce((scale, { bottom }) => scale * bottom, 1n);
  const whole = law.map(({ top, bottom }) => (top * common) / bottom);
  const divisor = whole.reduce(greatest, 0n);
  return whole
    .flatMap((value, i) => (value === 0n ? [] : [`${species[i]!}:${value / divisor}`]))
    .sort()
    .join(',');
}

function greatest(a: bigint, b: bigint): bigint {
  return b === 0n ? (a < 0n ? -a : a) : greatest(b, a % b);
}

function contentOf({ species, complexes }: Network, y: number): Map<string, Fraction> {
  const terms = new Map<string, Fraction>();
  for (let k = complexes.offsets[y]!; k < complexes.offsets[y + 1]!; k++) {
    const bottom = BigInt(complexes.denominators?.[k] ?? 1);
    terms.set(species[complexes.species[k]!]!, fraction(BigInt(complexes.numerators[k]!), bottom));
  }
  return terms;
}

function labelOf(content: ReadonlyMap<string, Fraction>): string {
  const terms = [...content].map(([name, { top, bottom }]) => `${top}/${bottom} ${name}`).sort();
  return terms.join(' + ') || '0';
}

function at(content: ReadonlyMap<string, Fraction>, name: string): Fraction {
  return content.get(name) ?? fraction(0n, 1n);
}

function touches(content: ReadonlyMap<string, Fraction>, set: readonly number[], species: readonly string[]) {
  return set.some((i) => content.has(species[i]!));
}

function closure(nodes: readonly number[], pairs: readonly (readonly [number, number])[]): Set<string> {
  const reach = new Set([...nodes.map((a) => `${a},${a}`), ...pairs.map(([a, b]) => `${a},${b}`)]);
  for (const k of nodes) {
    for (const i of nodes) {
      for (const j of nodes) if (reach.has(`${i},${k}`) && reach.has(`${k},${j}`)) reach.add(`${i},${j}`);
    }
  }
  return reach;
}

function groups(nodes: readonly number[], same: (a: number, b: number) => boolean): number[][] {
  const found: number[][] = [];
  for (const node of nodes) {
    const group = found.find(([first]) => same(first!, node));
    if (group) group.push(node);
    else found.push([node]);
  }
  return found;
}

/** Rank by Gaussian elimination over fractions; vectors as rows. */
function rank(vectors: readonly (readonly Fraction[])[]): number {
  return reduced(vectors).length;
}

function reduced(vectors: readonly (readonly Fraction[])[]): { row: Fraction[]; pivot: number }[] {
  const rows: { row: Fraction[]; pivot: number }[] = [];
  for (const vector of vectors) {
    let row = [...vector];
    for (const known of rows) {
      const factor = row[known.pivot]!;
      row = row.map((entry, k) => minus(entry, times(factor, known.row[k]!)));
    }
    const pivot = row.findIndex(({ top }) => top !== 0n);
    if (pivot < 0) continue;
    const lead = row[pivot]!;
    const scaled = row.map((entry) => over(entry, lead));
    for (const known of rows) {
      const factor = known.row[pivot]!;
      known.row = known.row.map((entry, k) => minus(entry, times(factor, scaled[k]!)));
    }
    rows.push({ row: scaled, pivot });
  }
  return rows;
}

/** Vectors x ≥ 0 of minimal support with constraint · x = 0 for every constraint. */
function positiveKernelVectors(size: number, constraints: readonly (readonly Fraction[])[]): Fraction[][] {
  const found: Fraction[][] = [];
  for (const set of subsets(size)) {
    if (found.some((vector) => vector.every(({ top }, i) => top === 0n || set.includes(i)))) continue;
    const rows = reduced(constraints.map((constraint) => set.map((i) => constraint[i]!)));
    if (set.length - rows.length !== 1) continue;
    const free = set.findIndex((_, k) => rows.every(({ pivot }) => pivot !== k));
    const values = set.map((_, k) => {
      const own = rows.find(({ pivot }) => pivot === k);
      return k === free ? fraction(1n, 1n) : minus(fraction(0n, 1n), own!.row[free]!);
    });
    if (values.some(({ top }) => top <= 0n)) continue;
    found.push(
      Array.from({ length: size }, (_, i) => (set.includes(i) ? values[set.indexOf(i)]! : fraction(0n, 1n))),
    );
  }
  return found;
}

function minimalSets(size: number, has: (set: readonly number[]) => boolean): number[][] {
  const found: number[][] = [];
  for (const set of subsets(size)) {
    if (!found.some((smaller) => smaller.every((i) => set.includes(i))) && has(set)) found.push(set);
  }
  return found;
}

/** Non-empty subsets, smaller ones first. */
function subsets(size: number): number[][] {
  const all = Array.from({ length: 2 ** size - 1 }, (_, code) =>
    Array.from({ length: size }, (_x, i) => i).filter((i) => ((code + 1) >> i) & 1),
  );
  return all.sort((a, b) => a.length - b.length);
}
