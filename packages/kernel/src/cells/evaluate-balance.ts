import { balanceSettings, type CellJob } from '@stillroom/shared/cells';
import type { EngineControl } from '../engine/control.ts';
import type { Evaluated } from '../engine/evaluated.ts';
import { CellFailure } from '../engine/failure.ts';
import { drawnNetwork } from '../engine/networks.ts';
import { RateError } from '../rates/index.ts';
import { analyseBalance } from './balance.ts';

/**
 * Works out the balance conditions of the network that a balance cell draws on.
 *
 * @throws CellFailure where the network cannot be read or the settings name a constant it does not have
 */
export function evaluateBalance(job: CellJob, control: EngineControl): Evaluated {
  const settings = balanceSettings.parse(job.settings);
  const { network, warnings } = drawnNetwork(job, control, settings.network);
  try {
    return { result: analyseBalance(network, settings.constants ?? {}), warnings };
  } catch (error) {
    if (!(error instanceof RateError)) throw error;
    throw new CellFailure(error.message, error.hint === null ? {} : { hint: error.hint });
  }
}
