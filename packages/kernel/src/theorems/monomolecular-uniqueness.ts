import type { TheoremContext } from './context.ts';
import { largeComplexes } from './monomolecular.ts';

/**
 * For a network without complexes of two or more molecules: whether its rate function is one-to-one on each class, which
 * is then the same as concordance. Null for other networks.
 *
 * N diag(κ) B is a compartmental matrix, so all products det N[I,J]·det B[J,I] have the sign (−1)^s or are 0. Its rank is s
 * exactly when every linkage class has one terminal strong class and, where the zero complex belongs to the class, that
 * one holds it: otherwise what arrives at the end of the class cannot leave, and nothing fixes its amount. With one
 * reactant each, the sign patterns of concordance are those of N diag(κ) B.
 */
export function monomolecularUniqueness(context: TheoremContext): boolean | null {
  if (!context.whole || largeComplexes(context).length > 0) return null;
  const { offsets } = context.structure.complexes;
  const isZero = (complex: number): boolean => offsets[complex] === offsets[complex + 1];
  return context.linkageClasses.every(({ complexes, terminalStrongClasses: [first, ...others] }) => {
    const open = complexes.some(isZero);
    return others.length === 0 && (!open || first!.some(isZero));
  });
}
