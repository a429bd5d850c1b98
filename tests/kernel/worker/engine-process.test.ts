import { EngineProcess, engineCommand } from '@stillroom/kernel/worker';
import type { ScriptResult } from '@stillroom/shared/cells';
import { tmpdir } from 'node:os';
import { afterEach, describe, expect, test } from 'vitest';
import { course, drawn, jobOf } from '../../support/cell-jobs.ts';
import { engineFolder } from '../../support/engine.ts';

const command = engineCommand({ folder: engineFolder, cwd: tmpdir(), confinements: [], heap: 256 });
const started: EngineProcess[] = [];
async function start(): Promise<EngineProcess> {
  const engine = await EngineProcess.start(command);
  started.push(engine);
  return engine;
}
afterEach(() => started.splice(0).forEach((engine) => engine.kill()));

const script = (text: string, inputs = {}, draws: string[] = []) => jobOf('script', text, inputs, { draws });
async function valueOf(engine: EngineProcess, text: string): Promise<unknown> {
  const outcome = await engine.run(script(text), { deadline: 20 });
  if (outcome.status === 'failed') throw new Error(outcome.error.message);
  return (outcome.result as ScriptResult).value;
}

/** More steps than a test waits for, within the limit of steps. */
const endless = jobOf(
  'trajectory',
  '',
  { clock: { ...drawn('network', undefined), text: '[i = 1..3000] A[i] <=> B[i] | 1, 2\nstart A[1] = 1\n' } },
  { network: 'clock', until: 1e12, method: 'nonstiff', rtol: 1e-12 },
);

describe('one process', () => {
  test('runs one job after another, with what they draw on', async () => {
    const engine = await start();
    const outcome = await engine.run(
      script('print(run1.times.length); return run1.species.P[3]', { run1: drawn('trajectory', course) }, [
        'run1',
      ]),
      { deadline: 20 },
    );
    expect(outcome).toMatchObject({ status: 'ok', result: { printed: ['4'], value: 9.8765 } });
    expect(await engine.run(jobOf('claim', '1 == 2'), { deadline: 20 })).toMatchObject({
      result: { verdict: 'fails' },
    });
  });

  test('ends a course at its deadline with what there is, and is as good as new', async () => {
    const engine = await start();
    const progress: number[] = [];
    const outcome = await engine.run(endless, {
      deadline: 4,
      onProgress: ({ share }) => progress.push(share ?? -1),
    });
    expect(outcome).toMatchObject({
      status: 'failed',
      partial: true,
      keep: false,
      result: { ended: 'stopped' },
    });
    expect(progress.length).toBeGreaterThan(0);
    expect(engine.usable).toBe(true);
    expect(await engine.run(jobOf('claim', '1 == 1'), { deadline: 20 })).toMatchObject({ status: 'ok' });
  });

  test('stops when asked, also before it has begun', async () => {
    const engine = await start();
    const soon = new AbortController();
    setTimeout(() => soon.abort(), 600);
    const outcome = await engine.run(endless, { deadline: 20, signal: soon.signal });
    expect(outcome.status === 'failed' && outcome.error.message).toContain('The run was stopped.');
    const never = await engine.run(endless, { deadline: 20, signal: AbortSignal.abort() });
    expect(never).toMatchObject({ status: 'failed', keep: false });
    expect(await valueOf(engine, 'return 1')).toBe(1);
  });

  test('an order to stop that comes too late does not touch the next run', async () => {
    const engine = await start();
    for (let round = 0; round < 20; round++) {
      const control = new AbortController();
      const first = engine.run(jobOf('claim', '1 == 1'), { deadline: 20, signal: control.signal });
      control.abort();
      await first;
      expect(await engine.run(jobOf('claim', '2 == 2'), { deadline: 20 })).toMatchObject({ status: 'ok' });
    }
  });

  test('that breaks off fails its run in words, and takes no other', async () => {
    const engine = await start();
    const run = engine.run(endless, { deadline: 20 });
    engine.kill();
    expect(await run).toMatchObject({ status: 'failed', keep: false });
    expect(engine.usable).toBe(false);
    expect(await engine.run(jobOf('claim', '1 == 1'), { deadline: 20 })).toMatchObject({ status: 'failed' });
  });

  test('that cannot start says so', async () => {
    const nowhere = engineCommand({ folder: '/nowhere', cwd: tmpdir(), confinements: [], heap: 64 });
    await expect(EngineProcess.start(nowhere)).rejects.toThrow('The engine process did not start');
  });
});

describe('scripts', () => {
  test('begin with the same chance and the same library, whatever ran before and wherever', async () => {
    const text = 'return [random(), Math.random(), math.random(), random()]';
    const [one, two] = [await start(), await start()];
    const first = await valueOf(one, text);
    await valueOf(
      one,
      'Math.random = () => 0; math.add = null; Array.prototype.map = null; globalThis.random = 1; return 1',
    );
    expect(await valueOf(one, text)).toEqual(first);
    expect(await valueOf(two, text)).toEqual(first);
    expect(new Set(first as number[]).size).toBe(4);
    expect(await valueOf(one, `${text} // another text, another seed`)).not.toEqual(first);
  });

  test('values that JSON has not are given as text, or as null with a warning', async () => {
    const engine = await start();
    const text =
      'return [NaN, 2n ** 70n, math.fraction(1, 3), math.matrix([[1, 2]]), math.unit("3 cm"), new Map([[1, 2]]), new Date(0), undefined]';
    const outcome = await engine.run(script(text), { deadline: 20 });
    expect(outcome).toMatchObject({
      status: 'ok',
      warnings: ['NaN and infinite numbers are given as null.'],
      result: {
        value: [
          null,
          '1180591620717411303424',
          '1/3',
          [[1, 2]],
          '3 cm',
          [[1, 2]],
          '1970-01-01T00:00:00.000Z',
          null,
        ],
      },
    });
  });

  test.each([
    ['\n\nfoo(1)', "'foo' is not defined", 3],
    ['const a = 1\nconst b = ;', 'unexpected token in expression', 2],
    ['x = 1', "'x' is not defined", 1],
    ['throw 5', 'The script threw 5.', undefined],
    ['return new Promise(() => 1)', 'not as a promise', undefined],
  ])('%j fails at its line', async (text, message, line) => {
    const outcome = await (await start()).run(script(text), { deadline: 20 });
    if (outcome.status === 'ok') throw new Error('did not fail');
    expect(outcome.error.message).toContain(message);
    if (line !== undefined) expect(outcome.error.line).toBe(line);
  });

  test('what was printed is kept when the script is stopped', async () => {
    const engine = await start();
    await valueOf(engine, 'return 1');
    const stop = new AbortController();
    const run = engine.run(script('print("so far"); for (;;);'), { deadline: 20, signal: stop.signal });
    setTimeout(() => stop.abort(), 500);
    expect(await run).toMatchObject({ status: 'failed', partial: true, result: { printed: ['so far'] } });
  });
});
