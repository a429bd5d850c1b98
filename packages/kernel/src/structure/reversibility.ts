import type { StructuralNetwork } from '../network/index.ts';

/** Reversible: every arrow has its reverse. An empty network is. */
export function isReversible(network: StructuralNetwork): boolean {
  return firstIrreversibleArrow(network) < 0;
}

/** The first arrow without reverse, or -1: the witness against reversibility. */
export function firstIrreversibleArrow(network: StructuralNetwork): number {
  return network.arrows.reverse.subarray(0, network.arrows.count).indexOf(-1);
}
