export { adjacencyBy } from './adjacency.ts';
export type { Adjacency } from './adjacency.ts';
export { coefficientLabel, complexLabel } from './labels.ts';
export type { ArrowTable, KeptReactions, WrittenReactions } from './merge-arrows.ts';
export { oneArrowOfEachPair, stoichiometry } from './stoichiometry.ts';
export type { Stoichiometry } from './stoichiometry.ts';
export { structuralNetwork, structuralNetworkAsWritten } from './structural-network.ts';
export type { StructuralNetwork } from './structural-network.ts';
