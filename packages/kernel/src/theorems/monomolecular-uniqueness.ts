import type { TheoremContext } from './context.ts';
import { largeComplexes } from './monomolecular.ts';

/**
 * For a network without complexes of two or more molecules: whether its rate function is one-to-one on each class, which
 * is then the same as concordance. Null for other networks.
 *
 * N diag(κ) B is a compartmental matrix, so all products det N[I,J]·det B[J,I] have the sign (−1)^s or are 0. Complexes
 * are single species and perhaps 0, so δ = 0 and s = n − ℓ, while N diag(κ) B has rank n − t on the complexes: the
 * products are not all 0 exactly when every linkage class has one terminal strong class. With one reactant each the sign
 * patterns of concordance are those of N diag(κ) B.
 */
export function monomolecularUniqueness(context: TheoremContext): boolean | null {
  if (!context.coefficients.whole || largeComplexes(context).length > 0) return null;
  return context.linkageClasses.every(({ terminalStrongClasses }) => terminalStrongClasses.length === 1);
}
