import { add, isZero, multiply, sign, ZERO } from '../../exact/index.ts';
import type { Rational } from '../../exact/index.ts';
import type { Amounts, PlainNetwork } from './plain-network.ts';
import { changeOf, dimension, paired } from './plain-network.ts';
import { fluxVector, speciesVector } from './reading.ts';
import type { Evidence, Finding } from './evidence.ts';
import { Unconfirmed } from './evidence.ts';

/** N v, by species. */
function production(plain: PlainNetwork, flux: ReadonlyMap<number, Rational>): Map<string, Rational> {
  const total = new Map<string, Rational>();
  for (const [index, value] of flux) {
    for (const [name, amount] of changeOf(plain, plain.reactions[index]!)) {
      total.set(name, add(total.get(name) ?? ZERO, multiply(value, amount)));
    }
  }
  return total;
}

function isLaw(plain: PlainNetwork, law: Amounts): boolean {
  return plain.reactions.every((reaction) => isZero(paired(law, changeOf(plain, reaction))));
}

/** A positive flux on every arrow in the kernel of N, or a function that no arrow lowers and some arrow raises. */
export function consistent(evidence: Evidence): string | null {
  return evidence.holds ? positiveFlux(evidence) : growing(evidence);
}

/** The opposite claim from the same evidence. */
export function notConsistent(evidence: Evidence): string | null {
  return evidence.holds ? growing(evidence) : positiveFlux(evidence);
}

function positiveFlux({ plain, witness }: Evidence): string | null {
  const flux = fluxVector(witness, plain);
  const carried = new Set(
    [...flux.keys()].map((index) => `${plain.reactions[index]!.from} ${plain.reactions[index]!.to}`),
  );
  if ([...flux.values()].some((value) => sign(value) <= 0)) return 'the flux is not positive.';
  if (plain.reactions.some(({ from, to }) => !carried.has(`${from} ${to}`)))
    return 'an arrow carries no flux.';
  return [...production(plain, flux).values()].every(isZero) ? null : 'the flux changes a species.';
}

function growing({ plain, witness }: Evidence): string | null {
  const weights = speciesVector(witness, plain);
  const gains = plain.reactions.map((reaction) => sign(paired(weights, changeOf(plain, reaction))));
  if (gains.some((gain) => gain < 0)) return 'a reaction lowers the weighted sum.';
  return gains.some((gain) => gain > 0) ? null : 'no reaction raises the weighted sum.';
}

/** A law that is positive on every species, or a flux of any sign whose production is nowhere negative and not zero. */
export function conservative({ plain, holds, witness }: Evidence): string | null {
  if (holds) {
    const law = speciesVector(witness, plain);
    if (plain.species.some((name) => sign(law.get(name) ?? ZERO) <= 0))
      return 'a coefficient is not positive.';
    return isLaw(plain, law) ? null : 'a reaction changes the weighted sum.';
  }
  const made = [...production(plain, fluxVector(witness, plain)).values()].map(sign);
  if (made.some((value) => value < 0)) return 'the flux uses up a species.';
  return made.some((value) => value > 0) ? null : 'the flux produces nothing.';
}

/** Siphons looked at before a "yes" is left unconfirmed. */
const MOST_SIPHONS = 20_000;

/**
 * A "no" names a siphon without law. A "yes" is confirmed by looking for a siphon that contains the support of no extreme
 * law: the greatest siphon is cut down at one species of a law it contains after another, in every way.
 */
export function noCriticalSiphon({ plain, holds, witness }: Evidence): Finding {
  if (!holds) {
    if (witness?.kind !== 'set' || !('species' in witness)) return 'no siphon is named.';
    const set = new Set(witness.species);
    if (set.size === 0 || !isSiphon(plain, set)) return 'the set named is not a siphon.';
    return holdsLaw(plain, set) ? 'the siphon named holds a law.' : null;
  }
  const laws = nonnegativeLaws(plain, plain.species)?.map((law) => [...law.keys()]) ?? null;
  if (laws === null) return new Unconfirmed('there are too many laws that are not negative.');
  const seen = new Set<string>();
  const open = [greatestSiphon(plain, plain.species)];
  for (let siphon = open.pop(); siphon !== undefined; siphon = open.pop()) {
    const key = siphon.join();
    if (siphon.length === 0 || seen.has(key)) continue;
    if (seen.size >= MOST_SIPHONS) return new Unconfirmed('there are too many siphons to look at.');
    seen.add(key);
    const members = new Set(siphon);
    const law = laws.find((support) => support.every((name) => members.has(name)));
    if (law === undefined) return `the siphon {${siphon.join(', ')}} is critical.`;
    for (const name of law)
      open.push(
        greatestSiphon(
          plain,
          siphon.filter((other) => other !== name),
        ),
      );
  }
  return null;
}

/** The union of all siphons among some species: a product without reactant among them is dropped until none is left. */
function greatestSiphon(plain: PlainNetwork, among: readonly string[]): string[] {
  const set = new Set(among);
  for (let changed = true; changed;) {
    changed = false;
    for (const { from, to } of plain.reactions) {
      if ([...plain.complexes[from]!.keys()].some((name) => set.has(name))) continue;
      for (const name of plain.complexes[to]!.keys()) if (set.delete(name)) changed = true;
    }
  }
  return [...set];
}

/** The law is one, is not negative, and lies in the siphon that the text names first. */
export function siphonLaw({ plain, witness, hypothesis }: Evidence): string | null {
  const law = speciesVector(witness, plain);
  const named = /\{([^}]*)\}/.exec(hypothesis.text)?.[1]?.split(', ') ?? [];
  if (law.size === 0 || [...law.values()].some((value) => sign(value) < 0))
    return 'a coefficient is negative.';
  // A long siphon is not written out in full; the law itself is still checked.
  if (named.includes('…')) return isLaw(plain, law) ? null : 'a reaction changes the weighted sum.';
  if (!isSiphon(plain, new Set(named))) return 'the set named is not a siphon.';
  if ([...law.keys()].some((name) => !named.includes(name))) return 'the law reaches beyond the siphon.';
  return isLaw(plain, law) ? null : 'a reaction changes the weighted sum.';
}

function isSiphon(plain: PlainNetwork, set: ReadonlySet<string>): boolean {
  const meets = (complex: number): boolean =>
    [...plain.complexes[complex]!.keys()].some((name) => set.has(name));
  return plain.reactions.every(({ from, to }) => !meets(to) || meets(from));
}

/** Whether some law is not negative, not zero and supported in the set. */
function holdsLaw(plain: PlainNetwork, set: ReadonlySet<string>): boolean {
  const laws = nonnegativeLaws(plain, [...set]);
  if (laws === null) throw new Error('there are too many laws');
  return laws.length > 0;
}

/** Extreme non-negative laws on some species, which bound what they contain; null where they are too many. */
export function nonnegativeLaws(plain: PlainNetwork, names: readonly string[]): Amounts[] | null {
  const changes = [
    ...new Map(plain.reactions.map((reaction) => [`${reaction.from} ${reaction.to}`, reaction])).values(),
  ].map((reaction) => changeOf(plain, reaction));
  return extremeSolutions(names, changes);
}

/** Extreme fluxes that change no species, by arrow "from to"; null where they are too many. */
export function extremeFluxes(plain: PlainNetwork): Amounts[] | null {
  const arrows = new Map(plain.reactions.map((reaction) => [`${reaction.from} ${reaction.to}`, reaction]));
  const changes = [...arrows].map(([key, reaction]) => [key, changeOf(plain, reaction)] as const);
  const balances = plain.species.map(
    (name): Amounts =>
      new Map(
        changes.flatMap(([key, change]) => (change.has(name) ? [[key, change.get(name)!] as const] : [])),
      ),
  );
  return extremeSolutions([...arrows.keys()], balances);
}

const MOST_RAYS = 600;

/** Extreme non-negative solutions of linear equations, one for each minimal support: one equation after another. */
function extremeSolutions(names: readonly string[], equations: readonly Amounts[]): Amounts[] | null {
  let rays: Map<string, Rational>[] = names.map(
    (name) => new Map([[name, { numerator: 1n, denominator: 1n }]]),
  );
  for (const equation of equations) {
    const values = rays.map((ray) => paired(ray, equation));
    const next = rays.filter((_, k) => isZero(values[k]!));
    rays.forEach((up, a) => {
      if (sign(values[a]!) <= 0) return;
      rays.forEach((down, b) => {
        if (sign(values[b]!) >= 0) return;
        const sum = new Map<string, Rational>();
        for (const [name, amount] of up) sum.set(name, multiply(amount, minus(values[b]!)));
        for (const [name, amount] of down)
          sum.set(name, add(sum.get(name) ?? ZERO, multiply(amount, values[a]!)));
        next.push(sum);
      });
    });
    if (next.length > MOST_RAYS) return null;
    // One ray for each minimal support is enough.
    rays = next.filter(
      (ray, k) =>
        !next.some(
          (other, l) =>
            l !== k && within(other, ray) && (other.size < ray.size || (other.size === ray.size && l < k)),
        ),
    );
  }
  return rays;
}

function within(a: ReadonlyMap<string, Rational>, b: ReadonlyMap<string, Rational>): boolean {
  return [...a.keys()].every((name) => b.has(name));
}

function minus(value: Rational): Rational {
  return { numerator: -value.numerator, denominator: value.denominator };
}

/** Whether a change of the species lies in the span of the reactions. */
export function liesInClass(plain: PlainNetwork, change: Amounts): boolean {
  const changes = plain.reactions.map((reaction) => changeOf(plain, reaction));
  return dimension([...changes, change]) === dimension(changes);
}

/** Whether a flux leaves every species unchanged. */
export function leavesSpeciesUnchanged(plain: PlainNetwork, flux: ReadonlyMap<number, Rational>): boolean {
  return [...production(plain, flux).values()].every(isZero);
}
