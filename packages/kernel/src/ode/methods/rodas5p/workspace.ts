import type { Elimination } from '../../linear/elimination.ts';
import type { OdeSystem } from '../../problem.ts';
import type { Layout } from '../../workspace.ts';
import { rodas5p } from './tableau.ts';

/** Regions of Rodas5P, by their first slot. */
export interface RosenbrockWorkspace {
  readonly timeDerivative: number;
  readonly factors: number;
  /** f of a stage. */
  readonly slope: number;
  /** The other half of a stage's right-hand side. */
  readonly past: number;
  /** K_1 to K_8. */
  readonly stages: readonly number[];
  /** D_1 to D_3 of the dense output. */
  readonly dense: readonly number[];
}

export function rosenbrockWorkspace(
  system: OdeSystem,
  elimination: Elimination,
  layout: Layout,
): RosenbrockWorkspace {
  return {
    timeDerivative: layout.region(system.dimension),
    factors: layout.region(elimination.factorLength),
    slope: layout.region(system.dimension),
    past: layout.region(system.dimension),
    stages: Array.from({ length: rodas5p.stages }, () => layout.region(system.dimension)),
    dense: rodas5p.dense.map(() => layout.region(system.dimension)),
  };
}
