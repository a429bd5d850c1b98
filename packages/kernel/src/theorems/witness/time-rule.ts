import type { Rational } from '../../exact/index.ts';
import { add, divide, isZero, multiply, negate, rational, toDouble, ZERO } from '../../exact/index.ts';
import type { Evidence, Finding } from './evidence.ts';
import { Unconfirmed } from './evidence.ts';
import type { PlainNetwork } from './plain-network.ts';
import { arrowRates, changeOf } from './plain-network.ts';

/** A polynomial in the species: coefficient by exponents, written in order of species. */
type Form = Map<string, Rational>;

/** Terms up to which derivatives are written out. */
const MOST_TERMS = 4_000;

/**
 * A "no" names a complex and the first derivative of inflow minus outflow that is not 0, which is worked out again
 * symbolically. A "yes" binds species that start in proportion (x_i = a_i u_g) while their equations agree, and finds that
 * inflow minus outflow of every complex of two or more molecules vanishes on the states so bound.
 */
export function largeComplexesBalance({ network, plain, holds, witness, hypothesis }: Evidence): Finding {
  const rates = arrowRates(plain);
  if (rates === null) return 'a constant is missing.';
  const start = plain.species.map((name) => network.start.get(network.species.indexOf(name))?.exact ?? ZERO);
  if (holds) return balancesForEver(plain, rates, start);
  const complex = witness?.kind === 'set' && 'complexes' in witness ? witness.complexes[0] : undefined;
  if (complex === undefined || plain.complexes[complex] === undefined) return 'no complex is named.';
  if (sizeOf(plain, complex) < 2) return 'the complex named has one molecule.';
  const order = Number(/t\^(\d+)/.exec(hypothesis.text)?.[1] ?? NaN);
  let form = imbalance(plain, rates, complex);
  for (let k = 0; k < order; k++) {
    form = alongSolution(plain, rates, form);
    if (form.size > MOST_TERMS) return new Unconfirmed('the derivative named is too long to write out.');
  }
  return isZero(valueAt(form, start)) ? 'the derivative named is 0.' : null;
}

function balancesForEver(
  plain: PlainNetwork,
  rates: ReadonlyMap<string, Rational>,
  start: readonly Rational[],
): Finding {
  const large = [...plain.complexes.keys()].filter((complex) => sizeOf(plain, complex) >= 2);
  if (slopes(plain, rates).every((slope) => isZero(valueAt(slope, start)))) {
    return large.every((complex) => isZero(valueAt(imbalance(plain, rates, complex), start)))
      ? null
      : 'a complex is out of balance at the start, which is steady.';
  }
  const group = boundSpecies(plain, rates, start);
  const vanishes = (form: Form): boolean => [...bound(form, group, start).values()].every(isZero);
  return large.every((complex) => vanishes(imbalance(plain, rates, complex)))
    ? null
    : new Unconfirmed('binding species that start in proportion does not show it.');
}

/** Groups of species (−1: at zero for ever) whose equations, divided by their starts, agree on the states bound by them. */
function boundSpecies(
  plain: PlainNetwork,
  rates: ReadonlyMap<string, Rational>,
  start: readonly Rational[],
): readonly number[] {
  const forms = slopes(plain, rates);
  let group: number[] = start.map((amount) => (isZero(amount) ? -1 : 0));
  for (;;) {
    const names = new Map<string, number>();
    const next = forms.map((form, i) => {
      const reduced = bound(form, group, start);
      const still = [...reduced.values()].every(isZero);
      if (group[i] === -1 && still) return -1;
      const own = isZero(start[i]!) ? rational(1n) : start[i]!;
      const text = [...reduced]
        .filter(([, value]) => !isZero(value))
        .map(([key, value]) => {
          const { numerator, denominator } = divide(value, own);
          return `${key}:${numerator}/${denominator}`;
        })
        .sort()
        .join();
      // A species that starts at zero and does not stay there stands alone.
      const key = isZero(start[i]!) ? `alone ${i}` : `${group[i]} ${text}`;
      if (!names.has(key)) names.set(key, names.size);
      return names.get(key)!;
    });
    if (next.every((value, i) => value === group[i])) return group;
    group = next;
  }
}

/** A form with x_i = a_i u_g, by exponents of the groups; terms with a species at zero are dropped. */
function bound(form: Form, group: readonly number[], start: readonly Rational[]): Form {
  const result: Form = new Map();
  for (const [key, coefficient] of form) {
    const powers = group.map(() => 0);
    let value = coefficient;
    let lost = false;
    key.split(',').forEach((text, i) => {
      for (let k = Number(text); k > 0; k--) {
        if (group[i] === -1) lost = true;
        else powers[group[i]!]!++;
        if (!isZero(start[i]!)) value = multiply(value, start[i]!);
      }
    });
    if (!lost) addTo(result, powers, value);
  }
  return result;
}

function sizeOf(plain: PlainNetwork, complex: number): number {
  return [...plain.complexes[complex]!.values()].reduce((sum, amount) => sum + toDouble(amount), 0);
}

/** Inflow minus outflow of a complex. */
function imbalance(plain: PlainNetwork, rates: ReadonlyMap<string, Rational>, complex: number): Form {
  const form: Form = new Map();
  for (const [key, rate] of rates) {
    const [from, to] = key.split(' ').map(Number);
    if (to === complex) addTo(form, exponentsOf(plain, from!), rate);
    if (from === complex) addTo(form, exponentsOf(plain, from), negate(rate));
  }
  return form;
}

/** The rate equations, by species. */
function slopes(plain: PlainNetwork, rates: ReadonlyMap<string, Rational>): Form[] {
  const forms = plain.species.map((): Form => new Map());
  for (const [key, rate] of rates) {
    const [from, to] = key.split(' ').map(Number);
    for (const [name, amount] of changeOf(plain, { from: from!, to: to! }))
      addTo(forms[plain.species.indexOf(name)]!, exponentsOf(plain, from!), multiply(rate, amount));
  }
  return forms;
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
  const equations = slopes(plain, rates);
  for (const [key, coefficient] of form) {
    const exponents = key.split(',').map(Number);
    equations.forEach((equation, i) => {
      if (exponents[i] === 0) return;
      const factor = multiply(coefficient, rational(BigInt(exponents[i]!)));
      for (const [other, rate] of equation) {
        const powers = other.split(',').map(Number);
        const moved = exponents.map((exponent, l) => exponent + powers[l]! - (l === i ? 1 : 0));
        addTo(derivative, moved, multiply(factor, rate));
      }
    });
  }
  return derivative;
}

function valueAt(form: Form, state: readonly Rational[]): Rational {
  let sum = ZERO;
  for (const [key, coefficient] of form) {
    let term = coefficient;
    key.split(',').forEach((power, i) => {
      for (let k = 0; k < Number(power); k++) term = multiply(term, state[i]!);
    });
    sum = add(sum, term);
  }
  return sum;
}
