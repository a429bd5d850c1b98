import type { Rational } from '../../exact/index.ts';
import { add, isZero, multiply, ONE, rational, sign, toDouble, ZERO } from '../../exact/index.ts';
import type { Amounts, PlainNetwork } from './plain-network.ts';
import { arrowRates, changeOf, paired } from './plain-network.ts';
import { massAction, namesPower } from './rate-rules.ts';
import { speciesVector } from './reading.ts';
import type { Evidence, Finding } from './evidence.ts';
import { Unconfirmed } from './evidence.ts';

/** Claims that carry no witness: nothing here can confirm or refute them. */
export function unchecked(): Finding {
  return new Unconfirmed('nothing here works this out again.');
}

/** Mass action (weights aside) with whole numbers of molecules. */
export function countRates(evidence: Evidence): string | null {
  const whole = evidence.plain.complexes.every((complex) =>
    [...complex.values()].every(({ denominator }) => denominator === 1n),
  );
  if (whole) return namesPower(evidence) ? null : massAction(evidence);
  return evidence.holds ? 'a coefficient is not a whole number.' : null;
}

function sizeOf(complex: Amounts): number {
  return [...complex.values()].reduce((sum, amount) => sum + toDouble(amount), 0);
}

/** All complexes have at most one molecule, or the one named has more. */
export function noLargeComplex({ plain, holds, witness }: Evidence): string | null {
  if (holds)
    return plain.complexes.every((complex) => sizeOf(complex) <= 1) ? null : 'some complex is larger.';
  const named =
    witness?.kind === 'set' && 'complexes' in witness ? plain.complexes[witness.complexes[0]!] : undefined;
  return named !== undefined && sizeOf(named) > 1 ? null : 'the complex named is not larger.';
}

/** Reactions between multiples of single species of equal size; or the reaction named is none. */
export function sitesOnly({ network, plain, holds, witness }: Evidence): string | null {
  const moves = plain.reactions.map(({ from, to }) => {
    const source = plain.complexes[from]!;
    const target = plain.complexes[to]!;
    return (
      source.size === 1 &&
      target.size === 1 &&
      sizeOf(source) === sizeOf(target) &&
      Number.isInteger(sizeOf(source))
    );
  });
  const untouched = network.events.length === 0 && network.rateRules.size === 0;
  if (!untouched) return holds ? 'something else changes a species.' : null;
  if (holds) return moves.every(Boolean) ? null : 'some reaction does something else.';
  return witness?.kind === 'arrow' && moves[witness.reaction] === false
    ? null
    : 'the reaction named moves mass.';
}

/** No reactant complex of two or more molecules raises the weighted sum (arrow by arrow, or on average). */
export function linearGrowth(evidence: Evidence): string | null {
  return evidence.holds ? driftComplaint(evidence, 2) : 'it is never said to fail.';
}

/** No reactant complex raises it, and for each species the complexes made of it alone lower it. */
export function inwardDrift(evidence: Evidence): string | null {
  if (!evidence.holds) return 'it is never said to fail.';
  const complaint = driftComplaint(evidence, 1);
  if (complaint !== null) return complaint;
  const { plain } = evidence;
  const weights = speciesVector(evidence.witness, plain);
  const alone = plain.species.every((name) =>
    [...drifts(evidence, weights)].some(([complex, values]) => {
      const { size } = plain.complexes[complex]!;
      return size === 1 && plain.complexes[complex]!.has(name) && values.some((value) => sign(value) < 0);
    }),
  );
  return alone ? null : 'some species is not drawn in.';
}

function driftComplaint(evidence: Evidence, smallest: number): string | null {
  const { plain, witness } = evidence;
  const weights = speciesVector(witness, plain);
  if (plain.species.some((name) => sign(weights.get(name) ?? ZERO) <= 0)) return 'a weight is not positive.';
  for (const [complex, values] of drifts(evidence, weights)) {
    if (sizeOf(plain.complexes[complex]!) >= smallest && values.some((value) => sign(value) > 0)) {
      return 'a reactant complex raises the weighted sum.';
    }
  }
  return null;
}

/** By reactant complex: w·ν of each arrow, or their mean for the constants of the text. */
function drifts({ plain, verdict }: Evidence, weights: Amounts): Map<number, Rational[]> {
  const rates = verdict.scope === 'these constants' ? arrowRates(plain) : null;
  const seen = new Set<string>();
  const byComplex = new Map<number, Rational[]>();
  for (const reaction of plain.reactions) {
    const key = `${reaction.from} ${reaction.to}`;
    if (seen.has(key)) continue;
    seen.add(key);
    const drift = paired(weights, changeOf(plain, reaction));
    const known = byComplex.get(reaction.from) ?? [];
    if (rates === null) byComplex.set(reaction.from, [...known, drift]);
    else byComplex.set(reaction.from, [add(known[0] ?? ZERO, multiply(rates.get(key)!, drift))]);
  }
  return byComplex;
}

/** A polynomial in the species: coefficient by exponents, written in order of species. */
type Form = Map<string, Rational>;

/** A "no" names a complex and the first derivative that is not 0, which is worked out again symbolically. */
export function largeComplexesBalance({ network, plain, holds, witness, hypothesis }: Evidence): Finding {
  if (holds) return new Unconfirmed('nothing here works this out again.');
  const rates = arrowRates(plain);
  const complex = witness?.kind === 'set' && 'complexes' in witness ? witness.complexes[0] : undefined;
  if (rates === null || complex === undefined || plain.complexes[complex] === undefined)
    return 'no complex is named.';
  if (sizeOf(plain.complexes[complex]) < 2) return 'the complex named has one molecule.';
  const order = Number(/t\^(\d+)/.exec(hypothesis.text)?.[1] ?? NaN);
  if (order > 2) return new Unconfirmed('derivatives of order three and more are not worked out again.');
  const start = new Map(
    plain.species.map((name) => [name, network.start.get(network.species.indexOf(name))?.exact ?? ZERO]),
  );
  let form: Form = new Map();
  for (const [key, rate] of rates) {
    const [from, to] = key.split(' ').map(Number);
    if (to === complex) addTo(form, exponentsOf(plain, from!), rate);
    if (from === complex) addTo(form, exponentsOf(plain, from), minus(rate));
  }
  for (let k = 0; k < order; k++) form = alongSolution(plain, rates, form);
  return isZero(valueAt(plain, form, start)) ? 'the derivative named is 0.' : null;
}

function exponentsOf(plain: PlainNetwork, complex: number): number[] {
  return plain.species.map((name) => toDouble(plain.complexes[complex]!.get(name) ?? ZERO));
}

function addTo(form: Form, exponents: readonly number[], value: Rational): void {
  const key = exponents.join();
  form.set(key, add(form.get(key) ?? ZERO, value));
}

/** ∇form · f, f the rate equations. */
function alongSolution(plain: PlainNetwork, rates: ReadonlyMap<string, Rational>, form: Form): Form {
  const derivative: Form = new Map();
  for (const [key, coefficient] of form) {
    const exponents = key.split(',').map(Number);
    for (const [arrow, rate] of rates) {
      const [from, to] = arrow.split(' ').map(Number);
      const reactants = exponentsOf(plain, from!);
      for (const [name, amount] of changeOf(plain, { from: from!, to: to! })) {
        const i = plain.species.indexOf(name);
        if (exponents[i] === 0) continue;
        const moved = exponents.map((exponent, l) => exponent + reactants[l]! - (l === i ? 1 : 0));
        addTo(
          derivative,
          moved,
          multiply(multiply(coefficient, rational(BigInt(exponents[i]!))), multiply(rate, amount)),
        );
      }
    }
  }
  return derivative;
}

function valueAt(plain: PlainNetwork, form: Form, state: ReadonlyMap<string, Rational>): Rational {
  let sum = ZERO;
  for (const [key, coefficient] of form) {
    const exponents = key.split(',').map(Number);
    let term = coefficient;
    plain.species.forEach((name, i) => {
      for (let k = 0; k < exponents[i]!; k++) term = multiply(term, state.get(name) ?? ONE);
    });
    sum = add(sum, term);
  }
  return sum;
}

function minus(value: Rational): Rational {
  return { numerator: -value.numerator, denominator: value.denominator };
}
