import type { TrajectoryResult, TrajectorySettings } from '@stillroom/shared/cells';
import type { Network } from '@stillroom/shared/network';
import { type Outcome, prepareSystem, solve } from '../ode/index.ts';
import type { Backend } from '../program/index.ts';
import {
  compileEvents,
  list,
  odeSystem,
  type RateEquations,
  rateEquations,
  RateError,
  resolveValues,
} from '../rates/index.ts';
import { conservationLawsOf, ConservationWatch, type Law } from './conservation.ts';
import { Course } from './course.ts';
import { resultUnits } from './units.ts';
import { stopInWords } from './stop-in-words.ts';

/** What an evaluation is given besides network and settings; nothing in it may change a complete result. */
export interface TrajectoryOptions {
  /** Asked every few steps; true ends the run with the course so far. */
  readonly deadline?: () => boolean;
  /** Told every few steps which share of the time span is done, 0 to 1. */
  readonly progress?: (share: number) => void;
  /** Conservation laws whose drift is reported, as coefficients by species; found here where they are not given. */
  readonly laws?: readonly Law[];
  /** For tests: the same bits come from either. */
  readonly backend?: Backend;
}

const defaultPoints = 201;
const defaultRelativeTolerance = 1e-6;
const defaultAbsoluteTolerance = 1e-12;

/**
 * Integrates the rate equations of a network. All numbers in the units of the network's text. Throws RateError for
 * settings that do not fit the network (unknown names, missing constants); trouble in the numbers is a stopped course.
 */
export function evaluateTrajectory(
  network: Network,
  settings: TrajectorySettings,
  options: TrajectoryOptions = {},
): TrajectoryResult {
  const { times, until } = timeGrid(settings);
  const values = resolveValues(network, settings);
  const equations = rateEquations(network, values);
  const events = compileEvents(equations, network.events);
  const sensitiveTo = sensitivityParameters(network, settings, values.constants);
  if (sensitiveTo.length > 0 && events.events.length > 0) {
    throw new RateError(
      'Sensitivities are not computed for a course with events.',
      'Leave out "sensitivities", or the events.',
    );
  }
  const outputs = network.outputs.map(({ name }) => equations.resolve(name)!);
  equations.requireValues();
  const system = odeSystem(
    equations,
    [{ name: 'outputs', nodes: outputs }, ...events.functions],
    sensitiveTo,
  );
  const method = settings.method ?? 'auto';
  const prepared = prepareSystem(system, method === 'auto' ? undefined : [method], options.backend);
  const start = new Float64Array(system.dimension);
  equations.variables.forEach((species, variable) => (start[variable] = values.start[species]!));

  const course = new Course(network, equations, prepared, sensitiveTo);
  const laws = new ConservationWatch(options.laws ?? conservationLawsOf(network), network, equations, start);
  const fired: { time: number; event: number }[] = [];
  const outcome = solve(prepared, {
    start,
    until,
    parameters: equations.parameterValues,
    times,
    method,
    relativeTolerance: settings.rtol ?? defaultRelativeTolerance,
    absoluteTolerance: absoluteTolerances(settings, equations, start, sensitiveTo),
    events: events.events,
    record: (time, state) => course.record(time, state),
    observe: (_time, state, jumped) => laws.observe(state, jumped),
    fired: (time, event) => fired.push({ time, event }),
    checkpoint: (time) => {
      options.progress?.(time / until);
      return !(options.deadline?.() ?? false);
    },
  });
  if (outcome.stop !== null) course.recordEnd(outcome.time);
  return result(network, equations, course, laws, outcome, fired);
}

function result(
  network: Network,
  equations: RateEquations,
  course: Course,
  laws: ConservationWatch,
  outcome: Outcome,
  fired: readonly { time: number; event: number }[],
): TrajectoryResult {
  const { steps, rejected, rhs, jacobians, factorizations, methods } = outcome.statistics;
  const units = resultUnits(network);
  const base = {
    times: course.times,
    species: course.species,
    derived: course.derived,
    ...(course.sensitivities === null ? {} : { sensitivities: course.sensitivities }),
    ...(fired.length === 0 ? {} : { fired }),
    statistics: { steps, rejected, rhs, jacobians, factorizations, method: methods.join(', then ') },
    conservationDrift: laws.drift,
    units,
  };
  if (outcome.stop === null) return { ...base, ended: 'complete' };
  const names = equations.variables.map((species) => network.species[species]!);
  const why = stopInWords(
    outcome.stop,
    outcome.time,
    units?.time ?? null,
    (component) => names[component % names.length]!,
  );
  return { ...base, ended: 'stopped', why };
}

/** The times of the result and the end of the course. */
function timeGrid(settings: TrajectorySettings): { times: readonly number[]; until: number } {
  const { times, until, points = defaultPoints } = settings;
  if (times !== undefined) {
    const unordered = times.findIndex((time, index) => index > 0 && time <= times[index - 1]!);
    if (unordered >= 0) {
      throw new RateError(`"times" must ascend, but ${times[unordered]} follows ${times[unordered - 1]}.`);
    }
    const last = times.at(-1) ?? 0;
    if (until !== undefined && until < last) {
      throw new RateError(`"until" is ${until}, but "times" go on to ${last}.`, 'Leave out one of the two.');
    }
    return { times, until: until ?? last };
  }
  if (until === undefined) throw new RateError('The end of the course is missing.', 'Give "until".');
  const grid = Array.from({ length: points }, (_, index) => (until * index) / (points - 1));
  return { times: grid, until };
}

/** Parameters by which the course is differentiated. */
function sensitivityParameters(
  network: Network,
  settings: TrajectorySettings,
  constants: readonly (number | null)[],
): number[] {
  const { sensitivities = false } = settings;
  const names = network.constants.map(({ name }) => name);
  if (sensitivities === false) return [];
  if (sensitivities === true) return constants.flatMap((value, index) => (value === null ? [] : [index]));
  const unknown = sensitivities.filter((name) => !names.includes(name));
  if (unknown.length > 0) {
    throw new RateError(
      `"sensitivities" asks for ${list(unknown)}, but the network has no constant of that name.`,
      names.length === 0 ? null : `It has ${list(names)}.`,
    );
  }
  return [...new Set(sensitivities)].map((name) => names.indexOf(name));
}

/** One tolerance for the species; for sensitivities the same divided by the size of the constant. */
function absoluteTolerances(
  settings: TrajectorySettings,
  equations: RateEquations,
  start: Float64Array,
  sensitiveTo: readonly number[],
): Float64Array {
  const largest = start.reduce((most, value) => Math.max(most, Math.abs(value)), 1);
  const tolerance = settings.atol ?? defaultAbsoluteTolerance * largest;
  const tolerances = new Float64Array(start.length).fill(tolerance);
  const count = equations.variables.length;
  sensitiveTo.forEach((parameter, k) => {
    const size = Math.abs(equations.parameterValues[parameter]!);
    tolerances.fill(size > 0 ? tolerance / size : tolerance, count * (1 + k), count * (2 + k));
  });
  return tolerances;
}
