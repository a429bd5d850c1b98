import type { Witness, WitnessNumber } from '@stillroom/shared/cells';
import type { Rational } from '../../exact/index.ts';
import { fromDouble, parseRational } from '../../exact/index.ts';
import type { Amounts, PlainNetwork } from './plain-network.ts';

/** The exact value of a number in a witness. */
export function exactOf(value: WitnessNumber): Rational {
  const exact = typeof value === 'number' ? fromDouble(value) : parseRational(value);
  if (exact === null) throw new Error(`"${value}" is not a number`);
  return exact;
}

/** A linear function (or change) of the species; unknown names are an error. */
export function speciesVector(witness: Witness | undefined, plain: PlainNetwork): Amounts {
  if (witness?.kind !== 'vector' || witness.of !== 'laws')
    throw new Error('a vector over the species is missing');
  return new Map(
    Object.entries(witness.entries).map(([name, value]) => {
      if (!plain.species.includes(name)) throw new Error(`there is no species ${name}`);
      return [name, exactOf(value)];
    }),
  );
}

/** A flux by reaction index; reactions without entry carry none. */
export function fluxVector(witness: Witness | undefined, plain: PlainNetwork): Map<number, Rational> {
  if (witness?.kind !== 'vector' || witness.of !== 'fluxes')
    throw new Error('a vector over the reactions is missing');
  return new Map(
    Object.entries(witness.entries).map(([key, value]) => {
      if (plain.reactions[Number(key)] === undefined) throw new Error(`there is no reaction ${key}`);
      return [Number(key), exactOf(value)];
    }),
  );
}
