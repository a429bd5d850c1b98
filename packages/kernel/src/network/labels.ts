import type { ComplexTable } from '@stillroom/shared/network';

/** A complex as written in results: "2 A + B", "1/2 A", "0" for the zero complex; species in order of first appearance. */
export function complexLabel(names: readonly string[], complexes: ComplexTable, complex: number): string {
  const terms: string[] = [];
  for (let k = complexes.offsets[complex]!; k < complexes.offsets[complex + 1]!; k++) {
    const coefficient = coefficientLabel(complexes.numerators[k]!, complexes.denominators?.[k] ?? 1);
    const name = names[complexes.species[k]!]!;
    terms.push(coefficient === '1' ? name : `${coefficient} ${name}`);
  }
  return terms.length === 0 ? '0' : terms.join(' + ');
}

/** A stoichiometric coefficient as text: "2", "1/2". */
export function coefficientLabel(numerator: number, denominator: number): string {
  return denominator === 1 ? String(numerator) : `${numerator}/${denominator}`;
}
