import type { CellJob } from '@stillroom/shared/cells';
import type { EngineControl } from '../engine/control.ts';
import type { Evaluated } from '../engine/evaluated.ts';
import { ownNetwork } from '../engine/networks.ts';
import { describeNetwork } from './network.ts';

/** Describes the network that a network cell holds. @throws CellFailure where its text cannot be read */
export function evaluateNetwork(job: CellJob, control: EngineControl): Evaluated {
  const { network, text, warnings } = ownNetwork(job, control);
  return { result: describeNetwork(network, text), warnings };
}
