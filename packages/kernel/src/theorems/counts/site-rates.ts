import { exactValue } from '@stillroom/shared/expression';
import type { Expression } from '@stillroom/shared/expression';
import type { Rational } from '../../exact/index.ts';
import { add, compare, divide, multiply, negate, ONE, rational, ZERO } from '../../exact/index.ts';
import type { TheoremContext } from '../context.ts';
import type { Polynomial } from '../polynomials/polynomial.ts';
import {
  add as addPolynomials,
  multiply as multiplyPolynomials,
  polynomial,
  scale,
} from '../polynomials/polynomial.ts';
import type { Fraction } from './fraction.ts';
import { addFractions, constantFraction, fractionOf, multiplyFractions } from './fraction.ts';

/** The arrows out of one site with the number of units they take, smallest first. */
export function leavingArrows(
  context: TheoremContext,
  species: number,
): { readonly arrow: number; readonly size: number }[] {
  return context.arrows
    .map(({ from }, arrow) => ({ arrow, term: context.terms(from)[0]! }))
    .filter(({ term }) => term.species === species)
    .map(({ arrow, term }) => ({ arrow, size: term.coefficient }))
    .sort((a, b) => a.size - b.size);
}

/**
 * The propensity of an arrow with n units on its site, exactly: V f(n/V) for a law in concentrations, k V^{1−m} n(n − 1)…
 * for mass action; equal rows added. Null where a value is missing or not exact. `others`: counts on other sites.
 */
export function rateAt(
  context: TheoremContext,
  arrow: number,
  n: bigint,
  others: ReadonlyMap<string, bigint> = new Map(),
): Rational | null {
  const volume = volumeOf(context);
  const size = context.terms(context.arrows[arrow]!.from)[0]!.coefficient;
  const site = context.species[context.terms(context.arrows[arrow]!.from)[0]!.species]!;
  if (volume === null) return null;
  let total: Rational = ZERO;
  for (const { law, constant } of rowsOf(context, arrow)) {
    const value =
      law === null
        ? constant && multiply(constant, falling(n, size, volume))
        : exactWithChoices(law, (name) => {
            const count = name === site ? n : others.get(name);
            return count === undefined ? namedValue(context, name) : divide(rational(count), volume);
          });
    if (value === null) return null;
    total = add(total, law === null ? value : multiply(value, volume));
  }
  return total;
}

/** The exact value of a law with `min` and `max` in it; null where anything else is not exact. */
function exactWithChoices(law: Expression, names: (name: string) => Rational | null): Rational | null {
  const inner = (part: Expression): Rational | null => exactWithChoices(part, names);
  switch (law.kind) {
    case 'binary': {
      const left = inner(law.left);
      const right = left && inner(law.right);
      if (right === null) return null;
      const [l, r] = [{ kind: 'name', name: 'l' } as const, { kind: 'name', name: 'r' } as const];
      return exactValue({ ...law, left: l, right: r }, (name) => (name === 'l' ? left : right));
    }
    case 'negate': {
      const of = inner(law.of);
      return of && negate(of);
    }
    case 'call': {
      if (law.name !== 'min' && law.name !== 'max') return null;
      const values = law.arguments.map(inner);
      const sense = law.name === 'min' ? -1 : 1;
      return values.reduce((best, value) =>
        best === null || value === null ? null : compare(value, best) * sense > 0 ? value : best,
      );
    }
    default:
      return exactValue(law, names);
  }
}

/** The same as a rational function of n; null where a law is none. */
export function rateFraction(context: TheoremContext, arrow: number): Fraction | null {
  const volume = volumeOf(context);
  const { species, coefficient: size } = context.terms(context.arrows[arrow]!.from)[0]!;
  if (volume === null) return null;
  let total = constantFraction(ZERO);
  for (const { law, constant } of rowsOf(context, arrow)) {
    const part =
      law === null
        ? constant && fallingFraction(constant, size, volume)
        : fractionOf(law, context.species[species]!, (name) => namedValue(context, name));
    if (part === null) return null;
    total = addFractions(total, law === null ? part : inCounts(part, volume));
  }
  return total;
}

/** f(n − by). */
export function shifted({ above, below, from }: Fraction, by: number): Fraction {
  const inner = polynomial(rational(BigInt(-by)), ONE);
  return { above: composed(above, inner), below: composed(below, inner), from: from + by };
}

interface Row {
  readonly law: Expression | null;
  readonly constant: Rational | null;
}

function rowsOf({ network, structure }: TheoremContext, arrow: number): Row[] {
  const rows: Row[] = [];
  for (let reaction = 0; reaction < structure.reactions.count; reaction++) {
    if (structure.reactions.arrow[reaction] !== arrow) continue;
    const written = structure.reactions.source[reaction]!;
    const law = network.laws[network.reactions.law[written]!];
    rows.push({
      law: law?.expression ?? null,
      constant: network.constants[network.reactions.constant[written]!]?.quantity?.exact ?? null,
    });
  }
  return rows;
}

/** The volume, 1 where none is given; null where it is not exact, there are several, or a species is held constant. */
function volumeOf({ network }: TheoremContext): Rational | null {
  if (network.compartments.length > 1 || network.fixed.size > 0) return null;
  const [compartment] = network.compartments;
  return compartment === undefined ? ONE : compartment.volume.exact;
}

function namedValue({ network }: TheoremContext, name: string): Rational | null {
  return network.constants.find((entry) => entry.name === name)?.quantity?.exact ?? null;
}

/** V^{1−m} n(n − 1) … (n − m + 1). */
function falling(n: bigint, size: number, volume: Rational): Rational {
  let value = volume;
  for (let k = 0n; k < BigInt(size); k++) value = divide(multiply(value, rational(n - k)), volume);
  return value;
}

function fallingFraction(constant: Rational, size: number, volume: Rational): Fraction {
  let value = constantFraction(multiply(constant, volume));
  for (let k = 0; k < size; k++) {
    const factor = { ...constantFraction(ONE), above: polynomial(rational(BigInt(-k)), ONE) };
    value = multiplyFractions(value, { ...factor, below: polynomial(volume) });
  }
  return value;
}

/** V f(n/V). */
function inCounts({ above, below, from }: Fraction, volume: Rational): Fraction {
  const inner = polynomial(ZERO, divide(ONE, volume));
  return {
    above: scale(composed(above, inner), volume),
    below: composed(below, inner),
    from: from * Math.max(1, Number(volume.numerator) / Number(volume.denominator)),
  };
}

/** p(q). */
function composed(p: Polynomial, q: Polynomial): Polynomial {
  return p.reduceRight<Polynomial>(
    (value, coefficient) => addPolynomials(multiplyPolynomials(value, q), polynomial(coefficient)),
    polynomial(),
  );
}
