import type { ComplexTable, Network } from '@stillroom/shared/network';
import { complexLabel } from './labels.ts';
import type { WrittenReactions } from './merge-arrows.ts';

/** A network without the species that are not part of its structure; arrows not yet merged. */
export interface StruckNetwork {
  readonly species: readonly string[];
  readonly sourceSpecies: Int32Array;
  readonly complexes: ComplexTable;
  readonly reactions: WrittenReactions;
  readonly reduced: boolean;
  readonly warnings: readonly string[];
}

/**
 * Strikes out species held constant by `fix` and species that follow a `rate` equation: removes them from every
 * complex, merges complexes that became equal (the first keeps its place), drops reactions whose sides became equal,
 * with a warning each, and complexes that no reaction uses.
 */
export function strikeOut(network: Network): StruckNetwork {
  const kept = keptSpecies(network);
  const reduced = network.fixed.size > 0 && kept.length < network.species.length;
  const merged =
    kept.length === network.species.length
      ? { complexes: network.complexes, image: null }
      : mergeComplexes(network.complexes, kept, network.species.length);
  const { reactions, dropped } = moveReactions(network, merged.image);
  const used = onlyUsedComplexes(merged.complexes, reactions);
  return {
    species: kept.length === network.species.length ? network.species : pick(network.species, kept),
    sourceSpecies: kept,
    complexes: used.complexes,
    reactions: used.reactions,
    reduced,
    warnings: dropped.map((reaction) => droppedSentence(network, reaction)),
  };
}

function keptSpecies(network: Network): Int32Array {
  const kept = new Int32Array(network.species.length);
  let count = 0;
  for (let i = 0; i < network.species.length; i++) {
    if (!network.fixed.has(i) && !network.rateRules.has(i)) kept[count++] = i;
  }
  return kept.subarray(0, count);
}

function pick(names: readonly string[], indices: Int32Array): string[] {
  return Array.from(indices, (i) => names[i]!);
}

/** Complexes over the kept species, equal ones merged; `image` maps old complexes to new ones. */
function mergeComplexes(
  table: ComplexTable,
  kept: Int32Array,
  speciesCount: number,
): { complexes: ComplexTable; image: Int32Array } {
  const place = new Int32Array(speciesCount).fill(-1);
  kept.forEach((old, i) => (place[old] = i));
  const image = new Int32Array(table.count);
  const known = new Map<string, number>();
  const offsets = [0];
  const species: number[] = [];
  const numerators: number[] = [];
  const denominators: number[] = [];
  for (let complex = 0; complex < table.count; complex++) {
    const terms: number[] = [];
    for (let k = table.offsets[complex]!; k < table.offsets[complex + 1]!; k++) {
      if (place[table.species[k]!]! >= 0) terms.push(k);
    }
    const key = terms
      .map((k) => `${table.species[k]}:${table.numerators[k]}/${table.denominators?.[k] ?? 1}`)
      .join();
    const earlier = known.get(key);
    if (earlier !== undefined) {
      image[complex] = earlier;
      continue;
    }
    image[complex] = known.size;
    known.set(key, known.size);
    for (const k of terms) {
      species.push(place[table.species[k]!]!);
      numerators.push(table.numerators[k]!);
      denominators.push(table.denominators?.[k] ?? 1);
    }
    offsets.push(species.length);
  }
  const complexes: ComplexTable = {
    count: known.size,
    offsets: Int32Array.from(offsets),
    species: Int32Array.from(species),
    numerators: Float64Array.from(numerators),
    denominators: table.denominators ? Float64Array.from(denominators) : null,
  };
  return { complexes, image };
}

function moveReactions(
  network: Network,
  image: Int32Array | null,
): { reactions: WrittenReactions; dropped: number[] } {
  const { count, from, to } = network.reactions;
  const dropped: number[] = [];
  const source = new Int32Array(count);
  const newFrom = image ? new Int32Array(count) : from;
  const newTo = image ? new Int32Array(count) : to;
  let kept = 0;
  for (let reaction = 0; reaction < count; reaction++) {
    if (image) {
      const a = image[from[reaction]!]!;
      const b = image[to[reaction]!]!;
      if (a === b) {
        dropped.push(reaction);
        continue;
      }
      newFrom[kept] = a;
      newTo[kept] = b;
    }
    source[kept++] = reaction;
  }
  const reactions = {
    count: kept,
    source: source.subarray(0, kept),
    from: newFrom.subarray(0, kept),
    to: newTo.subarray(0, kept),
  };
  return { reactions, dropped };
}

function onlyUsedComplexes(
  table: ComplexTable,
  reactions: WrittenReactions,
): { complexes: ComplexTable; reactions: WrittenReactions } {
  const used = new Uint8Array(table.count);
  for (let reaction = 0; reaction < reactions.count; reaction++) {
    used[reactions.from[reaction]!] = 1;
    used[reactions.to[reaction]!] = 1;
  }
  if (used.every((flag) => flag === 1)) return { complexes: table, reactions };
  const place = new Int32Array(table.count);
  const offsets = [0];
  const terms: number[] = [];
  for (let complex = 0; complex < table.count; complex++) {
    if (used[complex] === 0) continue;
    place[complex] = offsets.length - 1;
    for (let k = table.offsets[complex]!; k < table.offsets[complex + 1]!; k++) terms.push(k);
    offsets.push(terms.length);
  }
  const complexes: ComplexTable = {
    count: offsets.length - 1,
    offsets: Int32Array.from(offsets),
    species: Int32Array.from(terms, (k) => table.species[k]!),
    numerators: Float64Array.from(terms, (k) => table.numerators[k]!),
    denominators: table.denominators && Float64Array.from(terms, (k) => table.denominators![k]!),
  };
  const moved = { from: reactions.from.map((c) => place[c]!), to: reactions.to.map((c) => place[c]!) };
  return { complexes, reactions: { ...reactions, ...moved } };
}

function droppedSentence(network: Network, reaction: number): string {
  const { from, to, row } = network.reactions;
  const line = network.rows[row[reaction]!]?.line;
  const label = (complex: number) => complexLabel(network.species, network.complexes, complex);
  return (
    `${line === undefined ? '' : `Line ${line}: `}"${label(from[reaction]!)} -> ${label(to[reaction]!)}" changes ` +
    'nothing once the fixed species are struck out, so it is left out of the structure.'
  );
}
