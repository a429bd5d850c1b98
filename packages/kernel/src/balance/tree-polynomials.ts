import type { TheoremContext } from '../theorems/context.ts';

/** A sum of products of different arrows, each a sorted list of arrows; all coefficients are 1. */
export type TreePolynomial = readonly (readonly number[])[];

/** Complexes of a class, and choices of one arrow per complex, up to which trees are written out. */
const LARGEST_CLASS = 6;
const MOST_CHOICES = 2_000;

/**
 * The tree constants of one linkage class as polynomials in the constants of its arrows: for each complex the spanning
 * in-trees that end there. Null where they are too many to be read.
 */
export function treePolynomials(
  context: TheoremContext,
  complexes: readonly number[],
): ReadonlyMap<number, TreePolynomial> | null {
  if (complexes.length > LARGEST_CLASS) return null;
  const leaving = new Map<number, number[]>(complexes.map((complex) => [complex, []]));
  context.arrows.forEach(({ from }, arrow) => leaving.get(from)?.push(arrow));
  if (
    [...leaving.values()].reduce((product, arrows) => product * Math.max(1, arrows.length), 1) > MOST_CHOICES
  )
    return null;
  return new Map(complexes.map((root) => [root, inTrees(context, complexes, leaving, root)]));
}

function inTrees(
  context: TheoremContext,
  complexes: readonly number[],
  leaving: ReadonlyMap<number, readonly number[]>,
  root: number,
): TreePolynomial {
  const others = complexes.filter((complex) => complex !== root);
  const trees: number[][] = [];
  const next = new Map<number, number>();
  const chosen: number[] = [];
  const extend = (k: number): void => {
    if (k === others.length) {
      trees.push([...chosen].sort((a, b) => a - b));
      return;
    }
    const complex = others[k]!;
    for (const arrow of leaving.get(complex)!) {
      const target = context.arrows[arrow]!.to;
      if (closesCycle(next, complex, target)) continue;
      next.set(complex, target);
      chosen.push(arrow);
      extend(k + 1);
      chosen.pop();
      next.delete(complex);
    }
  };
  extend(0);
  return trees;
}

function closesCycle(next: ReadonlyMap<number, number>, start: number, target: number): boolean {
  for (let at: number | undefined = target; at !== undefined; at = next.get(at))
    if (at === start) return true;
  return false;
}
