import { expect } from 'vitest';
import type { Network } from '@stillroom/shared/network';
import { readNetwork } from '@stillroom/shared/notation';

/** The network of a text that must be without error. */
export function networkOf(text: string): Network {
  const { network, complaints } = readNetwork(text);
  const errors = complaints.filter(({ severity }) => severity === 'error');
  expect(errors, text).toEqual([]);
  if (!network) throw new Error('No error was told, and yet there is no network.');
  return network;
}

/** A complex in words, species in their order in the network: "2 A + 1/2 B". */
export function complexText({ species, complexes }: Network, index: number): string {
  const terms: string[] = [];
  for (let i = complexes.offsets[index] ?? 0; i < (complexes.offsets[index + 1] ?? 0); i += 1) {
    const numerator = complexes.numerators[i] ?? 0;
    const denominator = complexes.denominators?.[i] ?? 1;
    const coefficient = denominator === 1 ? String(numerator) : `${numerator}/${denominator}`;
    terms.push(`${coefficient === '1' ? '' : `${coefficient} `}${species[complexes.species[i] ?? -1]}`);
  }
  return terms.join(' + ') || '0';
}

export function complexTexts(network: Network): string[] {
  return Array.from({ length: network.complexes.count }, (_, i) => complexText(network, i));
}

/** Each reaction as "A + B -> C | k". */
export function reactionTexts(network: Network): string[] {
  const { from, to, constant, count } = network.reactions;
  return Array.from({ length: count }, (_, i) => {
    const arrow = `${complexText(network, from[i] ?? -1)} -> ${complexText(network, to[i] ?? -1)}`;
    const name = network.constants[constant[i] ?? -1]?.name;
    return name === undefined ? arrow : `${arrow} | ${name}`;
  });
}

/** Value of each constant by name. */
export function valuesOf(network: Network): Record<string, number | null> {
  return Object.fromEntries(network.constants.map(({ name, quantity }) => [name, quantity?.value ?? null]));
}

/** Messages of warnings. */
export function warningsOf(text: string): string[] {
  return readNetwork(text)
    .complaints.filter(({ severity }) => severity === 'warning')
    .map(({ message }) => message);
}
