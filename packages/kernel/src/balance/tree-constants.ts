import type { Rational } from '../exact/index.ts';
import { lcm, matrixOfRows, primitive, rightNullspace } from '../exact/index.ts';
import type { TheoremContext } from '../theorems/context.ts';

/** Complexes of one linkage class above which its tree constants are not worked out. */
export const LARGEST_TREE_CLASS = 120;

/**
 * The tree constants K_y of a weakly reversible network for given constants: on each linkage class the primitive positive
 * integer vector in the kernel of A_k. Up to one factor per class K_y is the sum over spanning in-trees of y of the
 * products of their constants (Kirchhoff; Craciun, Dickenstein, Shiu, Sturmfels 2009); the factor does not matter, because
 * it cancels in every balance condition. Null where a class is too large or the network is not weakly reversible.
 */
export function treeConstants(context: TheoremContext, constants: readonly Rational[]): bigint[] | null {
  const classes = context.linkageClasses;
  if (!context.weaklyReversible || classes.some(({ complexes }) => complexes.length > LARGEST_TREE_CLASS))
    return null;
  const result = Array.from({ length: context.complexCount }, () => 1n);
  const arrowsOf: number[][] = classes.map(() => []);
  context.arrows.forEach(({ from }, arrow) => arrowsOf[context.linkageClassOf[from]!]!.push(arrow));
  classes.forEach(({ complexes }, group) => {
    const arrows = arrowsOf[group]!;
    const scale = arrows.reduce((common, arrow) => lcm(common, constants[arrow]!.denominator), 1n);
    const place = new Map(complexes.map((complex, i) => [complex, i]));
    const matrix = complexes.map(() => complexes.map(() => 0n));
    for (const arrow of arrows) {
      const { numerator, denominator } = constants[arrow]!;
      const rate = (numerator * scale) / denominator;
      const from = place.get(context.arrows[arrow]!.from)!;
      const to = place.get(context.arrows[arrow]!.to)!;
      matrix[to]![from]! += rate;
      matrix[from]![from]! -= rate;
    }
    const [kernel] = rightNullspace(matrixOfRows(matrix, complexes.length));
    primitive(kernel!).forEach((value, i) => (result[complexes[i]!] = value));
  });
  return result;
}
