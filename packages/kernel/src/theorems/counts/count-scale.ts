import type { Network } from '@stillroom/shared/network';
import {
  avogadro,
  dimensionNames,
  dimensionOf,
  parseUnit,
  scaleOf,
  unitProduct,
} from '@stillroom/shared/units';
import type { Rational } from '../../exact/index.ts';
import { multiply, ONE, rational } from '../../exact/index.ts';

/**
 * The number of molecules in one unit of concentration of a written species: V for pure numbers and numbers per volume,
 * N_A V for molar units, V the volume of its compartment (1 where the text names none). Null where V is not exact, or
 * amount and volume do not make a number of molecules.
 */
export function moleculesPerUnit(network: Network, species: number): Rational | null {
  const own = network.compartments.find((part) => part.species.includes(species)) ?? network.compartments[0];
  const volume = own === undefined ? ONE : own.volume.exact;
  const amount = parseUnit(network.units.amount ?? '');
  const of = parseUnit(own?.unit ?? '');
  if (volume === null) return null;
  if (network.units.amount !== null && amount === null) return null;
  const unit = unitProduct(amount ?? [], of ?? []);
  const powers = dimensionOf(unit);
  const counted = dimensionNames.filter((_, i) => (powers[i] ?? 0) !== 0);
  if (counted.length === 0) return multiply(volume, scaleOf(unit));
  const [kind] = counted;
  if (counted.length > 1 || powers[dimensionNames.indexOf(kind!)] !== 1) return null;
  if (kind === 'time' || kind === 'length' || kind === 'mass') return null;
  const scaled = multiply(volume, scaleOf(unit));
  return kind === 'mol' ? multiply(scaled, rational(avogadro)) : scaled;
}
