import type { TrajectoryResult, TrajectorySettings } from '@stillroom/shared/cells';
import type { Network } from '@stillroom/shared/network';
import { type Outcome, PreparationStopped, type PreparedSystem, prepareSystem, solve } from '../ode/index.ts';
import type { Backend } from '../program/index.ts';
import {
  compileEvents,
  constantsSetByEvents,
  list,
  noSensitivities,
  odeSystem,
  parametersSetByEvents,
  planSensitivities,
  type RateEquations,
  rateEquations,
  RateError,
  resolveValues,
  sensitivityJumps,
  type SensitivityPlan,
  startsFunction,
  startsOf,
} from '../rates/index.ts';
import { conservationLawsOf, ConservationWatch } from './conservation.ts';
import { Course } from './course.ts';
import { droppedInWords } from './dropped-in-words.ts';
import { resultUnits } from './units.ts';
import { stopInWords } from './stop-in-words.ts';

/** What an evaluation is given besides network and settings; nothing in it may change a complete result. */
export interface TrajectoryOptions {
  /** Asked every few steps, and while large networks are prepared; true ends the run with the course so far. */
  readonly deadline?: () => boolean;
  /** Told every few steps which share of the time span is done, 0 to 1. */
  readonly progress?: (share: number) => void;
  /** Told in words what the reader of a result should know. */
  readonly warn?: (words: string) => void;
  /** For tests: the same bits come from either. */
  readonly backend?: Backend;
}

const defaultPoints = 201;
const defaultRelativeTolerance = 1e-6;
const defaultAbsoluteTolerance = 1e-12;

/**
 * Integrates the rate equations of a network. All numbers in the units of the network's text. Throws RateError for
 * settings that do not fit the network (unknown names, missing constants) and PreparationStopped where the deadline comes
 * before the course begins; trouble in the numbers is a stopped course.
 */
export function evaluateTrajectory(
  network: Network,
  settings: TrajectorySettings,
  options: TrajectoryOptions = {},
): TrajectoryResult {
  const checkpoint = (): void => {
    if (options.deadline?.() ?? false) throw new PreparationStopped();
  };
  const { times, until } = timeGrid(settings);
  const values = resolveValues(network, settings);
  const sensitiveTo = sensitivityParameters(network, settings, values.constants);
  const kept = new Set([...sensitiveTo, ...constantsSetByEvents(network, values.derivations).all]);
  for (const follower of values.derivations.followers(sensitiveTo)) kept.add(follower);
  const equations = rateEquations(network, values, { kept, checkpoint });
  if (equations.dropped.length > 0) options.warn?.(droppedInWords(network, equations.dropped));
  const plan = sensitivityPlan(network, equations, sensitiveTo);
  if (sensitiveTo.length > 0)
    warnOfJumps(network, [...sensitiveTo, ...values.derivations.followers(sensitiveTo)], options);
  const events = compileEvents(network, equations, plan);
  const outputs = network.outputs.map(({ name }) => equations.resolve(name)!);
  equations.requireValues();
  const system = odeSystem(equations, {
    functions: [{ name: 'outputs', nodes: outputs }, ...events.functions, ...startsOf(plan)],
    sensitivities: plan,
    checkpoint,
  });
  const method = settings.method ?? 'auto';
  const prepared = prepareSystem(system, {
    ...(method === 'auto' ? {} : { kinds: [method] }),
    ...(options.backend === undefined ? {} : { backend: options.backend }),
    checkpoint,
  });
  const start = new Float64Array(system.dimension);
  equations.variables.forEach((species, variable) => (start[variable] = values.start[species]!));
  const parameters = startParameters(equations, plan, prepared, start);

  const course = new Course(network, equations, prepared, plan);
  const laws = new ConservationWatch(
    conservationLawsOf(network, equations.volumes, checkpoint),
    network,
    equations,
    start,
  );
  const fired: { time: number; event: number }[] = [];
  const outcome = solve(prepared, {
    start,
    until,
    parameters,
    times,
    method,
    relativeTolerance: settings.rtol ?? defaultRelativeTolerance,
    absoluteTolerance: absoluteTolerances(settings, equations, start, sensitiveTo),
    events: events.events,
    sensitivities:
      plan.directions.length === 0
        ? null
        : { variables: equations.variables.length, directions: plan.directions },
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

function sensitivityPlan(
  network: Network,
  equations: RateEquations,
  sensitiveTo: readonly number[],
): SensitivityPlan {
  if (sensitiveTo.length === 0) return noSensitivities;
  const settable = parametersSetByEvents(network, equations);
  return planSensitivities(equations, sensitiveTo, settable, network.events.length > 0);
}

/**
 * The values of all parameters at the start: those of the equations, then those of the sensitivities. Puts what
 * sensitivities begin with into `start`.
 */
function startParameters(
  { parameterValues }: RateEquations,
  plan: SensitivityPlan,
  prepared: PreparedSystem,
  start: Float64Array,
): Float64Array {
  if (plan.starts.length === 0) return parameterValues;
  const all = new Float64Array(parameterValues.length + plan.parameters);
  all.set(parameterValues);
  prepared.setParameters(all);
  const values = prepared.evaluate(startsFunction, 0, prepared.common.state);
  all.set(values.subarray(0, plan.parameters), parameterValues.length);
  plan.startPlaces.forEach((place, index) => (start[place] = values[plan.parameters + index]!));
  return all;
}

/** Tells what sensitivities leave out where a rate jumps. */
function warnOfJumps(network: Network, by: readonly number[], { warn }: TrajectoryOptions): void {
  const jumps = sensitivityJumps(network, new Set(by));
  if (jumps.length === 0) return;
  const shown = jumps.slice(0, 3).map(({ where, what }) => `${where} (${what})`);
  const more = jumps.length > shown.length ? ` and ${jumps.length - shown.length} more` : '';
  warn?.(
    `Sensitivities leave out what a jump adds: ${shown.join(', ')}${more} may jump at a moment that the constants move. ` +
      'They hold until then, and where both sides meet. Write the jump as an `event` to have it counted.',
  );
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
