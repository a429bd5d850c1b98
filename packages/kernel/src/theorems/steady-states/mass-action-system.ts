import type { Rational } from '../../exact/index.ts';
import { echelon, toDouble } from '../../exact/index.ts';
import type { Interval, IntervalSystem } from '../../intervals/index.ts';
import { add, enclose, multiply, NAUGHT, power, scale, subtract } from '../../intervals/index.ts';
import type { TheoremContext } from '../context.ts';

/** One monomial rate: exponents of its reactants, and what it changes. */
interface Reaction {
  readonly reactants: readonly { readonly species: number; readonly exponent: number }[];
  readonly change: readonly { readonly species: number; readonly amount: number }[];
}

/**
 * The steady-state equations of a mass-action network: s independent rows of N v(x) = 0 and the m − s conservation laws
 * W x = T. Exponents are whole, species and constants those of the reduced network.
 */
export interface MassActionSystem {
  readonly species: number;
  readonly reactions: readonly Reaction[];
  /** Species whose rows of N are independent. */
  readonly pivotSpecies: readonly number[];
  /** Integer conservation laws. */
  readonly laws: readonly (readonly bigint[])[];
  readonly lawNumbers: readonly (readonly number[])[];
}

/** Sizes beyond which the equations are not formed. */
const MOST_SPECIES = 60;
const HIGHEST_EXPONENT = 40;

/** Builds the equations, or null where the network is too large or has coefficients that are not whole. */
export function massActionSystem(context: TheoremContext): MassActionSystem | null {
  return context.memo('mass-action system', () => {
    if (!context.dense || !context.whole || context.species.length > MOST_SPECIES) return null;
    if (context.highestCoefficient > HIGHEST_EXPONENT) return null;
    return {
      species: context.species.length,
      reactions: context.arrows.map(({ from, to }) => ({
        reactants: context
          .terms(from)
          .map(({ species, coefficient }) => ({ species, exponent: coefficient })),
        change: [...context.coefficients.change(from, to)].map(([species, amount]) => ({
          species,
          amount: Number(amount),
        })),
      })),
      pivotSpecies: echelon(context.stoichiometricMatrix).pivotRows,
      laws: context.lawBasis,
      lawNumbers: context.lawBasis.map((law) => law.map(Number)),
    };
  });
}

/** The monomial x^y of a reaction. */
export function monomial({ reactants }: Pick<Reaction, 'reactants'>, x: readonly number[]): number {
  let value = 1;
  for (const { species, exponent } of reactants) for (let k = 0; k < exponent; k++) value *= x[species]!;
  return value;
}

/** N v(x), by species. */
export function production(
  system: MassActionSystem,
  constants: readonly number[],
  x: readonly number[],
): number[] {
  const total = new Array<number>(system.species).fill(0);
  system.reactions.forEach((reaction, j) => {
    const rate = constants[j]! * monomial(reaction, x);
    for (const { species, amount } of reaction.change) total[species]! += amount * rate;
  });
  return total;
}

/** The Jacobian of N v(x), by rows; x positive. */
export function productionJacobian(
  system: MassActionSystem,
  constants: readonly number[],
  x: readonly number[],
): number[][] {
  const rows = Array.from({ length: system.species }, () => new Array<number>(system.species).fill(0));
  system.reactions.forEach((reaction, j) => {
    const rate = constants[j]! * monomial(reaction, x);
    for (const { species, exponent } of reaction.reactants) {
      const slope = (rate * exponent) / x[species]!;
      for (const { species: row, amount } of reaction.change) rows[row]![species]! += amount * slope;
    }
  });
  return rows;
}

/** The equations on boxes, for exact constants and totals. */
export function intervalSystem(
  system: MassActionSystem,
  constants: readonly Rational[],
  totals: readonly Rational[],
): IntervalSystem {
  const k = constants.map(enclose);
  const t = totals.map(enclose);
  const rowOf = new Map(system.pivotSpecies.map((species, row) => [species, row]));
  const s = system.pivotSpecies.length;
  return {
    size: system.species,
    values(box) {
      const values: Interval[] = Array.from({ length: system.species }, () => NAUGHT);
      system.reactions.forEach((reaction, j) => {
        const rate = multiply(k[j]!, boxMonomial(reaction, box, -1));
        for (const { species, amount } of reaction.change) {
          const row = rowOf.get(species);
          if (row !== undefined) values[row] = add(values[row]!, scale(rate, amount));
        }
      });
      system.lawNumbers.forEach((law, i) => {
        const sum = law.reduce<Interval>((total, weight, l) => add(total, scale(box[l]!, weight)), NAUGHT);
        values[s + i] = subtract(sum, t[i]!);
      });
      return values;
    },
    jacobian(box) {
      const rows: Interval[][] = Array.from({ length: system.species }, () =>
        Array.from({ length: system.species }, () => NAUGHT),
      );
      system.reactions.forEach((reaction, j) => {
        for (const { species, exponent } of reaction.reactants) {
          const slope = scale(multiply(k[j]!, boxMonomial(reaction, box, species)), exponent);
          for (const { species: changed, amount } of reaction.change) {
            const row = rowOf.get(changed);
            if (row !== undefined) rows[row]![species] = add(rows[row]![species]!, scale(slope, amount));
          }
        }
      });
      system.lawNumbers.forEach((law, i) => {
        rows[s + i] = law.map((weight) => (weight === 0 ? NAUGHT : { low: weight, high: weight }));
      });
      return rows;
    },
  };
}

/** x^y on a box, with one factor less of `lowered`. */
function boxMonomial({ reactants }: Reaction, box: readonly Interval[], lowered: number): Interval {
  let value: Interval = { low: 1, high: 1 };
  for (const { species, exponent } of reactants) {
    value = multiply(value, power(box[species]!, species === lowered ? exponent - 1 : exponent));
  }
  return value;
}

/** W x in doubles. */
export function totalsOf(system: MassActionSystem, x: readonly number[]): number[] {
  return system.lawNumbers.map((law) => law.reduce((sum, weight, i) => sum + weight * x[i]!, 0));
}

/** Constants in doubles. */
export function asDoubles(constants: readonly Rational[]): number[] {
  return constants.map(toDouble);
}
