import type { Network } from '@stillroom/shared/network';
import type { Rational } from '../../exact/index.ts';
import {
  add,
  equals,
  formatRational,
  isZero,
  multiply,
  negate,
  power,
  rational,
  subtract,
  divide,
  ZERO,
} from '../../exact/index.ts';

/** Amounts by species name; absent means 0. */
export type Amounts = ReadonlyMap<string, Rational>;

export interface PlainReaction {
  readonly from: number;
  readonly to: number;
  /** Its index among the reactions as written. */
  readonly source: number;
  readonly massAction: boolean;
  /** Whether its rate stands as a law in the text. */
  readonly written: boolean;
  /** Its own constant with the powers of fixed species; null where unknown, not rational or not mass action. */
  readonly constant: Rational | null;
}

/**
 * A network read again for the checker, in the plainest way and sharing no code with the structure that provers use.
 * Complex and reaction indices are those of the structure result.
 */
export interface PlainNetwork {
  readonly species: readonly string[];
  readonly complexes: readonly Amounts[];
  readonly reactions: readonly PlainReaction[];
}

/** Strikes out what is held constant, merges equal complexes, drops reactions that change nothing. */
export function plainNetwork(network: Network): PlainNetwork {
  const stays = (i: number): boolean => !network.fixed.has(i) && !network.rateRules.has(i);
  const whole = Array.from({ length: network.complexes.count }, (_, complex) => {
    const amounts = new Map<string, Rational>();
    const { offsets, species, numerators, denominators } = network.complexes;
    for (let k = offsets[complex]!; k < offsets[complex + 1]!; k++) {
      if (!stays(species[k]!)) continue;
      amounts.set(
        network.species[species[k]!]!,
        rational(BigInt(numerators[k]!), BigInt(denominators?.[k] ?? 1)),
      );
    }
    return amounts;
  });
  const keys = whole.map((amounts) =>
    [...amounts]
      .map(([name, amount]) => `${name} ${formatRational(amount)}`)
      .sort()
      .join(),
  );
  const written = Array.from({ length: network.reactions.count }, (_, j) => ({
    from: keys[network.reactions.from[j]!]!,
    to: keys[network.reactions.to[j]!]!,
    source: j,
    massAction: (network.laws[network.reactions.law[j]!] ?? { massAction: 0 }).massAction !== null,
    written: network.reactions.law[j]! >= 0,
    constant: constantOf(network, j),
  })).filter(({ from, to }) => from !== to);
  const used = new Set(written.flatMap(({ from, to }) => [from, to]));
  const order = [...new Set(keys)].filter((key) => used.has(key));
  return {
    species: network.species.filter((_, i) => stays(i)),
    complexes: order.map((key) => whole[keys.indexOf(key)]!),
    reactions: written.map(({ from, to, ...rest }) => ({
      from: order.indexOf(from),
      to: order.indexOf(to),
      ...rest,
    })),
  };
}

function constantOf(network: Network, reaction: number): Rational | null {
  const law = network.laws[network.reactions.law[reaction]!];
  const index = law === undefined ? network.reactions.constant[reaction]! : (law.massAction ?? -1);
  let value = network.constants[index]?.quantity?.exact ?? null;
  const { offsets, species, numerators, denominators } = network.complexes;
  const complex = network.reactions.from[reaction]!;
  for (let k = offsets[complex]!; k < offsets[complex + 1]! && value !== null; k++) {
    const held = network.fixed.get(species[k]!);
    if (held === undefined) continue;
    value =
      held.exact === null || denominators !== null
        ? null
        : multiply(value, power(held.exact, numerators[k]!));
  }
  return value;
}

/** The constant of each arrow "from to", equal rows added; null where one is missing or not positive. */
export function arrowRates(plain: PlainNetwork): Map<string, Rational> | null {
  const rates = new Map<string, Rational>();
  for (const { from, to, constant } of plain.reactions) {
    if (constant === null) return null;
    rates.set(`${from} ${to}`, add(rates.get(`${from} ${to}`) ?? ZERO, constant));
  }
  return [...rates.values()].some((rate) => rate.numerator <= 0n) ? null : rates;
}

/** Product minus reactant amounts of a reaction; amounts that cancel are absent. */
export function changeOf(plain: PlainNetwork, reaction: Pick<PlainReaction, 'from' | 'to'>): Amounts {
  const change = new Map(plain.complexes[reaction.to]!);
  for (const [name, amount] of plain.complexes[reaction.from]!) {
    change.set(name, subtract(change.get(name) ?? ZERO, amount));
  }
  for (const [name, amount] of change) if (isZero(amount)) change.delete(name);
  return change;
}

/** Σ weight · amount. */
export function paired(weights: Amounts, amounts: Amounts): Rational {
  let sum = ZERO;
  for (const [name, amount] of amounts) sum = add(sum, multiply(weights.get(name) ?? ZERO, amount));
  return sum;
}

/** Whether a directed path leads from one complex to another. */
export function leadsTo(plain: PlainNetwork, start: number, goal: number): boolean {
  const reached = new Set([start]);
  for (const complex of reached)
    for (const { from, to } of plain.reactions) if (from === complex) reached.add(to);
  return reached.has(goal);
}

/** Complexes by connected component, direction ignored. */
export function components(plain: PlainNetwork): number[][] {
  const left = new Set(plain.complexes.keys());
  const groups: number[][] = [];
  for (const start of left) {
    const group = new Set([start]);
    for (const complex of group) {
      for (const { from, to } of plain.reactions) {
        if (from === complex) group.add(to);
        if (to === complex) group.add(from);
      }
    }
    group.forEach((complex) => left.delete(complex));
    groups.push([...group].sort((a, b) => a - b));
  }
  return groups;
}

/** Dimension of the span of vectors, by rational elimination. */
export function dimension(vectors: readonly Amounts[]): number {
  const basis: { lead: string; vector: Map<string, Rational> }[] = [];
  for (const start of vectors) {
    const vector = new Map(start);
    for (const { lead, vector: earlier } of basis) {
      const factor = vector.get(lead);
      if (factor === undefined) continue;
      const times = negate(divide(factor, earlier.get(lead)!));
      for (const [name, amount] of earlier) {
        const sum = add(vector.get(name) ?? ZERO, multiply(times, amount));
        if (isZero(sum)) vector.delete(name);
        else vector.set(name, sum);
      }
    }
    const lead = [...vector.keys()][0];
    if (lead !== undefined) basis.push({ lead, vector });
  }
  return basis.length;
}

/** Deficiency of the complexes of a group of components together: complexes − components − dimension. */
export function deficiencyOf(plain: PlainNetwork, groups: readonly (readonly number[])[]): number {
  const members = new Set(groups.flat());
  const changes = plain.reactions
    .filter(({ from }) => members.has(from))
    .map((reaction) => changeOf(plain, reaction));
  return members.size - groups.length - dimension(changes);
}

/** Complexes from which some path does not lead back. */
export function nonterminal(plain: PlainNetwork): Set<number> {
  const outside = new Set<number>();
  plain.complexes.forEach((_, complex) => {
    const reached = new Set([complex]);
    for (const next of reached)
      for (const { from, to } of plain.reactions) if (from === next) reached.add(to);
    if ([...reached].some((other) => !leadsTo(plain, other, complex))) outside.add(complex);
  });
  return outside;
}

/** Whether two complexes have the same amount of a species. */
export function sameAmount(a: Amounts, b: Amounts, name: string): boolean {
  return equals(a.get(name) ?? ZERO, b.get(name) ?? ZERO);
}
