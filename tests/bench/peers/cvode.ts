import { spawnSync } from 'node:child_process';
import { copyFileSync, mkdirSync, mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Network } from '@stillroom/shared/network';

/** A problem built into a program that solves it with CVODE. */
export interface CvodeProblem {
  /** The state at the end; null where CVODE gave up. */
  solve(rtol: number, atol: number): number[] | null;
  /** Median microseconds of a solve. */
  time(rtol: number, atol: number, repeats: number): number;
}

/** Installs SUNDIALS (Debian's packages) where it is missing. */
export function needSundials(): void {
  if (spawnSync('sh', ['-c', 'ls /usr/include/cvode/cvode.h && command -v gcc']).status === 0) return;
  const installed = spawnSync('apt-get', ['install', '-y', '-q', 'gcc', 'libc6-dev', 'libsundials-dev'], {
    stdio: ['ignore', 'ignore', 'inherit'],
  });
  if (installed.status !== 0) throw new Error('SUNDIALS is not installed and apt-get could not install it.');
}

/** Writes the mass-action network as C and builds the program. */
export function buildCvode(name: string, network: Network, until: number): CvodeProblem {
  const folder = mkdtempSync(join(tmpdir(), `cvode-${name}-`));
  mkdirSync(folder, { recursive: true });
  copyFileSync(new URL('cvode.c', import.meta.url), join(folder, 'cvode.c'));
  writeFileSync(join(folder, 'problem.h'), problemHeader(network, until));
  const flags = ['-O3', '-march=native', '-o', 'cvode', 'cvode.c'];
  const libraries = [
    '-lsundials_cvode',
    '-lsundials_nvecserial',
    '-lsundials_sunmatrixdense',
    '-lsundials_sunlinsoldense',
    '-lm',
  ];
  const built = spawnSync('gcc', [...flags, ...libraries], { cwd: folder, encoding: 'utf8' });
  if (built.status !== 0) throw new Error(`gcc could not build the peer: ${built.stderr}`);
  const run = (words: readonly (string | number)[]): string =>
    spawnSync(join(folder, 'cvode'), words.map(String), { encoding: 'utf8' }).stdout.trim();
  return {
    solve(rtol, atol) {
      const [code, ...state] = run(['once', rtol, atol]).split(' ').map(Number);
      return code === undefined || code < 0 ? null : state;
    },
    time: (rtol, atol, repeats) => Number(run(['time', rtol, atol, repeats])),
  };
}

/** Right-hand side and Jacobian (by columns) of a mass-action network, unrolled. */
function problemHeader(network: Network, until: number): string {
  const size = network.species.length;
  const start = network.species.map((_, species) => network.start.get(species)?.value ?? 0);
  const rates: string[] = [];
  const changes = network.species.map<string[]>(() => []);
  const slopes: string[] = [];
  const { complexes, reactions, constants } = network;
  const side = (complex: number): number[] =>
    Array.from(
      { length: complexes.offsets[complex + 1]! - complexes.offsets[complex]! },
      (_, n) => complexes.offsets[complex]! + n,
    ).flatMap((entry) => new Array<number>(complexes.numerators[entry]!).fill(complexes.species[entry]!));
  for (let r = 0; r < reactions.count; r++) {
    const reactants = side(reactions.from[r]!);
    const net = new Map<number, number>();
    for (const species of reactants) net.set(species, (net.get(species) ?? 0) - 1);
    for (const species of side(reactions.to[r]!)) net.set(species, (net.get(species) ?? 0) + 1);
    const k = constants[reactions.constant[r]!]!.quantity!.value.toExponential(17);
    rates.push(`double r${r} = ${[k, ...reactants.map((species) => `y[${species}]`)].join(' * ')};`);
    for (const [species, change] of net) if (change !== 0) changes[species]!.push(`${change}.0 * r${r}`);
    for (const by of new Set(reactants)) {
      const order = reactants.filter((species) => species === by).length;
      const rest = reactants.slice();
      rest.splice(rest.indexOf(by), 1);
      const slope = [`${order}.0`, k, ...rest.map((species) => `y[${species}]`)].join(' * ');
      for (const [species, change] of net) {
        if (change !== 0) slopes.push(`columns[${by}][${species}] += ${change}.0 * (${slope});`);
      }
    }
  }
  return `
#define SIZE ${size}
#define END ${until.toExponential(17)}
static const double start[SIZE] = {${start.join(', ')}};
static void rates(const double *restrict y, double *restrict f) {
  ${rates.join('\n  ')}
  ${changes.map((terms, species) => `f[${species}] = ${terms.join(' + ') || '0'};`).join('\n  ')}
}
static void slopes(const double *restrict y, double **columns) {
  ${slopes.join('\n  ')}
}
`;
}
