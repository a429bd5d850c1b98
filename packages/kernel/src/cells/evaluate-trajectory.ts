import {
  type CellJob,
  type TrajectoryResult,
  type TrajectorySettings,
  trajectorySettings,
} from '@stillroom/shared/cells';
import type { Network } from '@stillroom/shared/network';
import { readNetwork } from '@stillroom/shared/notation';
import { type EngineControl, StopRequested } from '../engine/control.ts';
import type { Evaluated } from '../engine/evaluated.ts';
import { CellFailure } from '../engine/failure.ts';
import { drawnNetwork } from '../engine/networks.ts';
import { PreparationStopped } from '../ode/index.ts';
import { RateError } from '../rates/index.ts';
import { evaluateTrajectory } from './trajectory.ts';

/** The network with the cell's own events, which are written and read as those of a network text are. */
function withEvents(
  network: Network,
  text: string,
  events: NonNullable<TrajectorySettings['events']>,
): Network {
  const lines = events.map(({ when, set }) => {
    const assignments = Object.entries(set).map(([name, value]) => `${name} = ${value}`);
    return `event when ${when}: ${assignments.join(', ')}`;
  });
  const broken = lines.findIndex((line) => /[\r\n#|\\]/u.test(line));
  if (broken >= 0)
    throw new CellFailure(`Event ${broken + 1} holds a sign that has no place in an expression.`);
  const base = text.endsWith('\n') ? text : `${text}\n`;
  const first = base.split('\n').length;
  const read = readNetwork(`${base}${lines.join('\n')}\n`);
  const error = read.complaints.find(({ severity }) => severity === 'error');
  if (read.network === null || error !== undefined) {
    const which = error === undefined ? 1 : Math.max(1, error.line - first + 1);
    throw new CellFailure(`Event ${which} cannot be read: ${error?.message ?? ''}`.trim(), {
      ...(error?.hint === null || error?.hint === undefined ? {} : { hint: error.hint }),
    });
  }
  return { ...network, events: read.network.events };
}

function course(network: Network, settings: TrajectorySettings, control: EngineControl): Evaluated {
  let share = 0;
  let stop: StopRequested | null = null;
  const warnings: string[] = [];
  const deadline = (): boolean => {
    try {
      control.checkpoint(share);
      return false;
    } catch (error) {
      if (!(error instanceof StopRequested)) throw error;
      stop = error;
      return true;
    }
  };
  let result: TrajectoryResult;
  try {
    result = evaluateTrajectory(network, settings, {
      progress: (done) => (share = done),
      warn: (words) => warnings.push(words),
      deadline,
    });
  } catch (error) {
    throw error instanceof PreparationStopped && stop !== null ? stop : error;
  }
  const ended = stop as StopRequested | null;
  const why = result.why ?? '';
  if (ended !== null) return { result, warnings, ended: { message: `${ended.message} ${why}`.trim() } };
  if (result.ended !== 'complete') warnings.push(why);
  return { result, warnings };
}

/**
 * Integrates the rate equations of the network that a trajectory cell draws on. A course that cannot go on to its end is a
 * result with `ended: "stopped"` and a warning; one that is ended from outside is what there was of it.
 *
 * @throws CellFailure where the network cannot be read or the settings do not fit it
 */
export function evaluateTrajectoryCell(job: CellJob, control: EngineControl): Evaluated {
  const settings = trajectorySettings.parse(job.settings) as TrajectorySettings;
  const given = drawnNetwork(job, control, settings.network);
  const events = settings.events ?? [];
  const network = events.length === 0 ? given.network : withEvents(given.network, given.text, events);
  try {
    return course(network, settings, control);
  } catch (error) {
    if (!(error instanceof RateError)) throw error;
    throw new CellFailure(error.message, error.hint === null ? {} : { hint: error.hint });
  }
}
