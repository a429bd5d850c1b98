/**
 * Work against precision on the published stiff problems: the fastest tolerance that reaches a given error at the end
 * point, cold (first course of a fresh process) and warm, and how long a large system takes to be prepared; with --peers
 * in turn with SUNDIALS CVODE. Every case has a limit (--seconds=20): what is not finished by then is said so.
 */
import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { prepareSystem, solve } from '@stillroom/kernel/ode';
import { evaluateTrajectory } from '@stillroom/kernel/cells';
import { odeSystem, rateEquations, resolveValues } from '@stillroom/kernel/rates';
import type { Network } from '@stillroom/shared/network';
import { readNetwork } from '@stillroom/shared/notation';
import { networkOf, type PlainNetwork } from '../support/network-of.ts';
import table from '../reference/dynamics.json' with { type: 'json' };
import { buildCvode, type CvodeProblem, needSundials } from './peers/cvode.ts';

interface Problem {
  readonly name: string;
  readonly network: Network;
  readonly until: number;
  /** Reference end point by species; 0 entries are not compared. */
  readonly end: Readonly<Record<string, number>>;
}

interface Setting {
  readonly rtol: number;
  readonly atol: number;
}

/** A solver of one problem at any tolerance. */
interface Solver {
  state(setting: Setting): ArrayLike<number> | null;
  /** Microseconds of one solve. */
  time(setting: Setting, repeats: number): number;
}

const problems = ['ivp_hires', 'ivp_orego', 'ivp_rober', 'ivp_pollu'].map<Problem>((id) => {
  const entry = table.entries.find((one) => one.id === id)!;
  const plain = entry.problem as unknown as PlainNetwork & { t_end: number };
  return {
    name: id.slice(4).toUpperCase(),
    network: networkOf(plain),
    until: plain.t_end,
    end: entry.reference as unknown as Record<string, number>,
  };
});

const given = process.argv.find((word) => word.startsWith('--seconds='));
/** Milliseconds for one case. */
const caseLimit = 1000 * Number(given?.slice('--seconds='.length) ?? 20);

/** Says when the time of a case is over. */
function caseClock(): () => boolean {
  const end = performance.now() + caseLimit;
  return () => performance.now() > end;
}

const targets = [1e-4, 1e-7];
const tolerances = Array.from({ length: 23 }, (_, n) => 10 ** (-2 - n / 2));
const atolFactors = [1, 1e-3, 1e-6, 1e-9];
const rounds = 7;

const median = (values: readonly number[]): number => values.toSorted((a, b) => a - b)[values.length >> 1]!;

function ours({ network, until }: Problem, over: () => boolean): Solver {
  const equations = rateEquations(network, resolveValues(network, {}));
  const system = odeSystem(equations);
  const prepared = prepareSystem(system, { kinds: ['stiff'] });
  const start = Float64Array.from(equations.variables, (species) => network.start.get(species)?.value ?? 0);
  const end = new Float64Array(start.length);
  const run = ({ rtol, atol }: Setting): boolean => {
    const outcome = solve(prepared, {
      start,
      until,
      parameters: equations.parameterValues,
      times: [until],
      method: 'stiff',
      relativeTolerance: rtol,
      absoluteTolerance: new Float64Array(start.length).fill(atol),
      record: (_, state) => end.set(prepared.vector(state)),
      checkpoint: () => !over(),
    });
    return outcome.stop === null;
  };
  return {
    state: (setting) => (run(setting) ? end : null),
    time(setting, repeats) {
      const begin = performance.now();
      for (let r = 0; r < repeats; r++) run(setting);
      return ((performance.now() - begin) / repeats) * 1000;
    },
  };
}

const theirs = (peer: CvodeProblem): Solver => ({
  state: ({ rtol, atol }) => peer.solve(rtol, atol),
  time: ({ rtol, atol }, repeats) => peer.time(rtol, atol, repeats),
});

function error(problem: Problem, state: ArrayLike<number> | null): number {
  if (state === null) return Infinity;
  return Math.max(
    ...problem.network.species.map((name, i) => {
      const expected = problem.end[name] ?? 0;
      return expected === 0 ? 0 : Math.abs(state[i]! - expected) / Math.abs(expected);
    }),
  );
}

/**
 * The fastest setting that reaches the target, as do the next two tighter ones, so that luck does not count; tolerances
 * are tried from loose to tight until that is so.
 */
function fastest(problem: Problem, solver: Solver, target: number, over: () => boolean): Setting | null {
  let best: { setting: Setting; time: number } | null = null;
  for (const factor of atolFactors) {
    let reached = 0;
    const grid = tolerances.map((rtol) => ({ rtol, atol: rtol * factor }));
    const third = grid.findIndex((setting) => {
      reached = !over() && error(problem, solver.state(setting)) <= target ? reached + 1 : 0;
      return reached === 3;
    });
    if (third < 0) continue;
    const setting = grid[third - 2]!;
    const time = median([1, 2, 3].map(() => solver.time(setting, 20)));
    if (best === null || time < best.time) best = { setting, time };
  }
  return best?.setting ?? null;
}

function warm(withPeers: boolean): void {
  console.log(
    'Warm, time of one solve at the fastest tolerance that reaches the error (median of paired rounds):',
  );
  for (const problem of problems) for (const target of targets) warmCase(problem, target, withPeers);
}

function warmCase(problem: Problem, target: number, withPeers: boolean): void {
  const over = caseClock();
  const solvers = new Map<string, Solver>([['Stillroom', ours(problem, over)]]);
  if (withPeers) solvers.set('CVODE', theirs(buildCvode(problem.name, problem.network, problem.until)));
  const chosen = [...solvers].map(([name, solver]) => ({
    name,
    solver,
    setting: fastest(problem, solver, target, over),
    times: [] as number[],
  }));
  let done = 0;
  for (; done < rounds && !over(); done++) {
    for (const { solver, setting, times } of chosen) {
      if (setting !== null) times.push(solver.time(setting, 50));
    }
  }
  const title = `  ${problem.name.padEnd(6)} error ${target}`;
  if (over()) {
    console.log(`${title}: not finished in ${caseLimit / 1000} s (${done} of ${rounds} rounds)`);
    return;
  }
  const words = chosen.map(({ name, solver, setting, times }) => {
    if (setting === null) return `${name} does not reach it`;
    const reached = error(problem, solver.state(setting)).toExponential(1);
    return `${name} ${median(times).toFixed(1)} µs (rtol ${setting.rtol.toExponential(1)}, error ${reached})`;
  });
  const [own, peer] = chosen;
  const ratios = (peer?.times ?? []).map((time, round) => time / own!.times[round]!);
  const ratio = ratios.length > 0 ? `, ratio ${median(ratios).toFixed(1)}` : '';
  console.log(`${title}: ${words.join('; ')}${ratio}`);
}

/** The one-dimensional Brusselator with diffusion on `cells` cells, two species in each. */
function brusselator(cells: number): Network {
  const { network } = readNetwork(
    [
      `[i = 1..${cells}] 0 -> X[i] | a = 1`,
      `[i = 1..${cells}] X[i] -> Y[i] | b = 3`,
      `[i = 1..${cells}] 2 X[i] + Y[i] -> 3 X[i] | c = 1`,
      `[i = 1..${cells}] X[i] -> 0 | d = 1`,
      `[i = 1..${cells - 1}] X[i] <=> X[i+1] | p = 20000, p`,
      `[i = 1..${cells - 1}] Y[i] <=> Y[i+1] | p, p`,
      `start X[i] = 1 for i = 1..${cells}, Y[i] = 3 for i = 1..${cells}`,
    ].join('\n'),
  );
  if (network === null) throw new Error('The Brusselator cannot be read.');
  return network;
}

/** From the network to the first step, and the longest time between two looks at the deadline, in milliseconds. */
function preparation(): void {
  console.log('Preparing a Brusselator of 2,000 species, to the first step (first, second and third time):');
  const network = brusselator(1000);
  const times = [1, 2, 3].map(() => {
    const begin = performance.now();
    let [last, longest, first] = [begin, 0, NaN];
    evaluateTrajectory(
      network,
      { network: 'n', until: 1e-3 },
      {
        progress: () => {
          if (Number.isNaN(first)) first = performance.now() - begin;
        },
        deadline: () => {
          longest = Math.max(longest, performance.now() - last);
          last = performance.now();
          return !Number.isNaN(first);
        },
      },
    );
    return `${first.toFixed(0)} ms (longest between two looks ${longest.toFixed(0)} ms)`;
  });
  console.log(`  ${times.join(', ')}`);
}

/** The first course of a process, from the network to the result, in milliseconds, and the second. */
function coldCourse(name: string): void {
  const { network, until } = problems.find((problem) => problem.name === name)!;
  const times = [0, 1].map(() => {
    const begin = performance.now();
    evaluateTrajectory(network, { network: 'n', until, rtol: 1e-6 });
    return performance.now() - begin;
  });
  console.log(times.map((time) => time.toFixed(2)).join(' '));
}

function cold(): void {
  console.log(
    'Cold, network to result (201 points, rtol 1e-6, method auto) in a fresh process, median of 5:',
  );
  const file = fileURLToPath(import.meta.url);
  for (const { name } of problems) {
    const runs = Array.from({ length: 5 }, () => {
      const child = spawnSync(process.execPath, [...process.execArgv, file, `--cold=${name}`], {
        encoding: 'utf8',
        timeout: caseLimit,
      });
      return child.status === 0 ? [child.stdout.trim().split(' ').map(Number)] : [];
    }).flat();
    const at = (place: number): string => median(runs.map((times) => times[place] ?? NaN)).toFixed(1);
    const figures = runs.length === 0 ? 'not finished' : `first ${at(0)} ms, second ${at(1)} ms`;
    console.log(`  ${name.padEnd(6)} ${figures}`);
  }
}

const only = process.argv.find((word) => word.startsWith('--cold='));
if (only !== undefined) {
  coldCourse(only.slice('--cold='.length));
} else {
  const withPeers = process.argv.includes('--peers');
  if (withPeers) needSundials();
  cold();
  preparation();
  warm(withPeers);
}
