/** A rooted tree by its branches; the single vertex has none. */
export interface RootedTree {
  readonly branches: readonly RootedTree[];
}

/** How many vertices a tree has: its order. */
export function orderOf({ branches }: RootedTree): number {
  return branches.reduce((sum, branch) => sum + orderOf(branch), 1);
}

/** γ(t): the order of the tree times that of each branch, and so on (Butcher 1963). */
export function density(tree: RootedTree): number {
  return tree.branches.reduce((product, branch) => product * density(branch), orderOf(tree));
}

/** All rooted trees of up to `order` vertices. */
export function rootedTrees(order: number): RootedTree[] {
  const byOrder: RootedTree[][] = [[], [{ branches: [] }]];
  for (let n = 2; n <= order; n++) {
    const smaller = byOrder.flat();
    byOrder.push(forests(smaller, n - 1, 0).map((branches) => ({ branches })));
  }
  return byOrder.flat();
}

/** Multisets of the given trees, from place `from` on, of `vertices` vertices in all. */
function forests(trees: readonly RootedTree[], vertices: number, from: number): RootedTree[][] {
  if (vertices === 0) return [[]];
  return trees.flatMap((tree, index) => {
    const rest = vertices - orderOf(tree);
    if (index < from || rest < 0) return [];
    return forests(trees, rest, index).map((forest) => [tree, ...forest]);
  });
}

type Matrix = readonly (readonly number[])[];

/**
 * The elementary weights of the stages for a tree. Below a vertex with one branch stands `single` (α + Γ in a
 * Rosenbrock method), else `several` (α); for a Runge–Kutta method both are its matrix (Hairer, Wanner, Solving
 * Ordinary Differential Equations II, IV.7).
 */
export function stageWeights(tree: RootedTree, several: Matrix, single: Matrix): number[] {
  const matrix = tree.branches.length === 1 ? single : several;
  const factors = tree.branches.map((branch) => multiply(matrix, stageWeights(branch, several, single)));
  return matrix.map((_, i) => factors.reduce((product, factor) => product * factor[i]!, 1));
}

export function multiply(matrix: Matrix, vector: readonly number[]): number[] {
  return matrix.map((row) => dot(row, vector));
}

export function dot(a: readonly number[], b: readonly number[]): number {
  return b.reduce((sum, value, i) => sum + value * (a[i] ?? 0), 0);
}
