import { type CellJob, type StructureSettings, structureSettings } from '@stillroom/shared/cells';
import type { EngineControl } from '../engine/control.ts';
import type { Evaluated } from '../engine/evaluated.ts';
import { drawnNetwork } from '../engine/networks.ts';
import { analyseStructure } from './structure.ts';

/**
 * Analyses the network that a structure cell draws on, and sets the variants it names beside it.
 *
 * @throws CellFailure where a network cannot be read
 */
export function evaluateStructure(job: CellJob, control: EngineControl): Evaluated {
  const settings = structureSettings.parse(job.settings) as StructureSettings;
  const { network, warnings } = drawnNetwork(job, control, settings.network);
  const compare = (settings.compare ?? []).map((name) => ({
    name,
    network: drawnNetwork(job, control, name).network,
  }));
  const result = analyseStructure(network, {
    compare,
    checkpoint: (progress, words) => control.checkpoint(progress, words),
  });
  return { result, warnings };
}
