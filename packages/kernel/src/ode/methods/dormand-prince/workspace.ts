import type { OdeSystem } from '../../problem.ts';
import type { Layout } from '../../workspace.ts';
import { dormandPrince } from './tableau.ts';

/** Regions of Dormand–Prince: the slopes of the seven stages, by their first slot. */
export interface ExplicitWorkspace {
  readonly slopes: readonly number[];
}

export function explicitWorkspace(system: OdeSystem, layout: Layout): ExplicitWorkspace {
  return { slopes: Array.from({ length: dormandPrince.stages }, () => layout.region(system.dimension)) };
}
