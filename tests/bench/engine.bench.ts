/**
 * What stands between a keystroke and the computing itself: planning a notebook, reaching a warm worker, starting a script,
 * ending one that does not end, and replacing a worker. Milliseconds.
 */
import type { CellJob } from '@stillroom/shared/cells';
import { newPlanMemory, planNotebook, type PlannableCell } from '@stillroom/shared/plan';
import { createPool, type Pool } from '../../packages/server/src/modules/compute/pool/index.ts';
import { stalls } from '../attacks/script-attempts.ts';

interface Row {
  readonly what: string;
  readonly times: readonly number[];
  readonly target: number;
}

const quantile = (times: readonly number[], share: number): number =>
  times.toSorted((a, b) => a - b)[Math.min(times.length - 1, Math.floor(share * times.length))] ?? Number.NaN;

function print({ what, times, target }: Row): void {
  const [median, late] = [quantile(times, 0.5), quantile(times, 0.95)].map((time) =>
    time.toFixed(2).padStart(9),
  );
  const met = quantile(times, 0.5) <= target ? 'met' : 'NOT MET';
  console.log(
    `${what.padEnd(58)} median ${median}  p95 ${late}  target ${String(target).padStart(4)}  ${met}`,
  );
}

async function timed(runs: number, act: (run: number) => unknown): Promise<number[]> {
  const times: number[] = [];
  for (let run = 0; run < runs; run++) {
    const began = performance.now();
    await act(run);
    times.push(performance.now() - began);
  }
  return times;
}

/** Ten groups of six cells: a network of twenty rows and what draws on it. */
function notebook(edit: string): PlannableCell[] {
  const rows = Array.from({ length: 20 }, (_, row) => `A${row} + B -> C${row} | k${row} = ${row + 1}`).join(
    '\n',
  );
  return Array.from({ length: 10 }, (_, group): PlannableCell[] => {
    const [network, run] = [`network${group}`, `run${group}`];
    const cell = (kind: PlannableCell['kind'], name: string, text: string, settings = {}): PlannableCell => ({
      id: `${kind}${group}`,
      kind,
      name,
      text,
      settings,
    });
    return [
      cell('network', network, group === 0 ? `${rows}\n${edit}` : rows),
      cell('trajectory', run, '', { network, until: 50 }),
      cell('structure', `shape${group}`, '', { network }),
      cell('prose', '', `${'Words and $x^2$. '.repeat(60)}=[${run}.species.C1, last, 3 digits]`),
      cell('claim', `claim${group}`, `last(${run}.species.C1) > 1`),
      cell('plot', `plot${group}`, '', { draw: [{ cell: run, x: 'times', y: ['species.C1'] }] }),
    ];
  }).flat();
}

async function planning(): Promise<void> {
  const memory = newPlanMemory();
  planNotebook(notebook(''), memory);
  const texts = Array.from({ length: 400 }, (_, run) => notebook(`X${run} -> Y`));
  const times = await timed(texts.length, (run) => planNotebook(texts[run] ?? [], memory));
  print({ what: 'plan of 60 cells after a keystroke in a network', times, target: 3 });
}

let jobs = 0;
const job = (kind: CellJob['kind'], text: string): CellJob => ({
  digest: `sha256:${String(jobs++).padStart(64, '0')}`,
  kind,
  text,
  settings: {},
  inputs: {},
});

/** Waits until all workers of a pool are there and idle. */
async function whole(pool: Pool, size: number): Promise<void> {
  const idle = () => pool.workers().filter(({ state }) => state === 'idle').length;
  while (idle() < size) await new Promise((resolve) => setTimeout(resolve, 1));
}

async function replacing(pool: Pool, size: number): Promise<number[]> {
  const times: number[] = [];
  for (let run = 0; run < 8; run++) {
    await whole(pool, size);
    const victim = pool.workers()[0]?.id;
    const began = performance.now();
    process.kill(Number(victim), 'SIGKILL');
    while (pool.workers().some(({ id }) => id === victim))
      await new Promise((resolve) => setTimeout(resolve, 1));
    await whole(pool, size);
    times.push(performance.now() - began);
  }
  return times;
}

async function engine(): Promise<void> {
  const size = 2;
  const first: { pool?: Pool } = {};
  const opening = await timed(1, async () => {
    first.pool = createPool({ size });
    await first.pool.run(job('claim', '1 == 1'), { deadline: 30 });
  });
  const { pool } = first;
  if (pool === undefined) return;
  console.log(`Workers: ${pool.isolation}`);
  print({ what: 'first answer of a new pool, confinement tried out', times: opening, target: 1000 });
  await timed(20, () => pool.run(job('script', 'return 1'), { deadline: 30 }));
  const claims = await timed(500, () => pool.run(job('claim', '1 == 1'), { deadline: 30 }));
  print({ what: 'a request to a warm worker and back', times: claims, target: 1 });
  const script = () => pool.run(job('script', 'return math.mean([1, 2, 3])'), { deadline: 30 });
  // As fast as keys come: between two of them the sandbox is made whole again.
  const scripts: number[] = [];
  for (let run = 0; run < 100; run++) {
    await new Promise((resolve) => setTimeout(resolve, 30));
    scripts.push(...(await timed(1, script)));
  }
  print({ what: 'a script with the maths library, warm', times: scripts, target: 5 });
  print({ what: 'the same, one right after the other', times: await timed(100, script), target: 5 });
  const deadline = 0.25;
  const late: number[] = [];
  for (const text of Object.values(stalls)) {
    await whole(pool, size + 1);
    let began = 0;
    await pool.run(job('script', text), { deadline, onBegin: () => (began = performance.now()) });
    late.push(Math.max(0, performance.now() - began - deadline * 1000));
  }
  print({ what: `over after its deadline: ${late.length} scripts that stall`, times: late, target: 100 });
  console.log(
    `${''.padEnd(58)} latest ${Math.max(...late)
      .toFixed(2)
      .padStart(9)}`,
  );
  print({ what: 'a worker that is killed is replaced', times: await replacing(pool, size + 1), target: 200 });
  await pool.close();
}

await planning();
await engine();
