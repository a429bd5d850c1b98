import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { createPool, type Pool } from '../../../../../packages/server/src/modules/compute/pool/index.ts';
import { Turns } from '../../../../../packages/server/src/modules/compute/pool/turns.ts';
import { jobOf } from '../../../../support/cell-jobs.ts';
import '../../../../support/engine.ts';

const claim = (n: number) => jobOf('claim', `${n} == ${n}`);
const endless = jobOf('script', 'print(1); for (;;);');

describe('turns', () => {
  const take = (turns: Turns<{ owner: string; n: number }>) => {
    const item = turns.next();
    return item === undefined ? null : `${item.owner}${item.n}`;
  };
  test('owners alternate, each one in the order of arrival', () => {
    const turns = new Turns<{ owner: string; n: number }>();
    for (const n of [1, 2, 3]) turns.add({ owner: 'a', n });
    turns.add({ owner: 'b', n: 1 });
    expect([take(turns), take(turns), take(turns), take(turns), take(turns)]).toEqual([
      'a1',
      'b1',
      'a2',
      'a3',
      null,
    ]);
  });
  test('an owner’s parts alternate too, each in the order of arrival; one that may not go on is passed over', () => {
    interface Item {
      readonly owner: string;
      readonly part: string;
      readonly n: number;
    }
    const turns = new Turns<Item>();
    const add = (owner: string, part: string, n: number) => turns.add({ owner, part, n });
    for (const n of [1, 2, 3, 4]) add('a', 'x', n);
    add('a', 'y', 1);
    add('b', 'x', 1);
    const next = (may?: (item: Item) => boolean) => {
      const item = turns.next(may);
      if (item !== undefined) turns.done(item);
      return item === undefined ? null : `${item.owner}${item.part}${item.n}`;
    };
    expect([next(), next(), next()]).toEqual(['ax1', 'bx1', 'ay1']);
    expect(next(({ n }) => n !== 2)).toBe('ax3');
    expect([next(), next(), next()]).toEqual(['ax2', 'ax4', null]);
    expect(turns.size).toBe(0);
  });
  test('who has less under way comes first; what is taken out is not served', () => {
    const turns = new Turns<{ owner: string; n: number }>();
    const items = [1, 2].map((n) => ({ owner: 'a', n }));
    items.forEach((item) => turns.add(item));
    const first = turns.next();
    const late = { owner: 'b', n: 1 };
    turns.add(late);
    turns.add({ owner: 'b', n: 2 });
    expect(turns.waiting()).toEqual(
      new Map([
        ['a', 1],
        ['b', 2],
      ]),
    );
    expect(turns.remove(late)).toBe(true);
    expect(turns.remove(late)).toBe(false);
    expect(take(turns)).toBe('b2');
    if (first !== undefined) turns.done(first);
    expect(take(turns)).toBe('a2');
  });
});

describe('a pool', () => {
  let pool: Pool;
  beforeAll(() => {
    pool = createPool({ size: 2 });
  });
  afterAll(() => pool.close());

  test('runs what is asked before it is ready, and says how workers are confined', async () => {
    const outcomes = await Promise.all(
      Array.from({ length: 30 }, (_, n) => pool.run(claim(n), { deadline: 20 })),
    );
    expect(outcomes.every(({ status }) => status === 'ok')).toBe(true);
    expect(pool.isolation).toMatch(/\.$/u);
  });

  test('endless runs are ended while others go on, and the workers are three again', async () => {
    const slow = [0, 1, 2].map(() => pool.run(endless, { deadline: 0.4, owner: 'slow' }));
    const quick = Array.from({ length: 10 }, (_, n) => pool.run(claim(n), { deadline: 20, owner: 'quick' }));
    for (const outcome of await Promise.all(slow))
      expect(outcome).toMatchObject({ status: 'failed', keep: false });
    for (const outcome of await Promise.all(quick)) expect(outcome.status).toBe('ok');
    await expect
      .poll(() => pool.workers().filter(({ state }) => state === 'idle').length, { timeout: 5000 })
      .toBe(3);
  });

  test('a short run does not wait behind endless ones, however many there are', async () => {
    const stop = new AbortController();
    let ended = 0;
    const wild = (owner: string) =>
      pool.run(endless, { deadline: 100, owner, signal: stop.signal }).finally(() => (ended += 1));
    const runaways = ['a', 'a', 'a', 'a', 'a'].map(wild);
    const short = jobOf('script', 'return 6 * 7');
    for (const owner of ['a', 'b', 'c']) {
      expect((await pool.run(claim(7), { deadline: 20, owner })).status).toBe('ok');
      expect(await pool.run(short, { deadline: 20, owner })).toMatchObject({ status: 'ok' });
    }
    runaways.push(wild('b'));
    // One owner never has all the slow places.
    await expect.poll(() => pool.workers().map(({ owner }) => owner), { timeout: 10_000 }).toContain('b');
    expect(await pool.run(short, { deadline: 20, owner: 'a' })).toMatchObject({ status: 'ok' });
    expect(ended).toBe(0);
    stop.abort();
    for (const outcome of await Promise.all(runaways))
      expect(outcome).toMatchObject({ status: 'failed', error: { message: 'The run was stopped.' } });
    await expect
      .poll(() => pool.workers().map(({ state }) => state), { timeout: 5000 })
      .toEqual(['idle', 'idle', 'idle']);
  });

  test('a run that was broken off for others begins anew and comes to its end', async () => {
    const small = createPool({ size: 1, promptly: 50 });
    const stop = new AbortController();
    const begun: string[] = [];
    const wild = (owner: string) => small.run(endless, { deadline: 100, owner, signal: stop.signal });
    const runaways = ['a', 'b'].map(wild);
    const slow = jobOf('script', 'let n = 0; for (let i = 0; i < 3000000; i++) n += i % 7; return n');
    const expected = await pool.run(slow, { deadline: 60 });
    const run = small.run(slow, { deadline: 60, owner: 'c', onBegin: () => void begun.push('c') });
    await expect.poll(() => begun.length, { timeout: 20_000 }).toBe(1);
    // Somebody waits: both slow places are taken, so it makes room.
    expect((await small.run(claim(1), { deadline: 60, owner: 'd' })).status).toBe('ok');
    stop.abort();
    expect(await run).toEqual(expected);
    expect(begun).toEqual(['c', 'c']);
    await Promise.all(runaways);
    await small.close();
  });

  test('a worker that is killed is replaced', async () => {
    const [victim] = pool.workers();
    process.kill(Number(victim?.id), 'SIGKILL');
    await expect.poll(() => pool.workers().map(({ id }) => id), { timeout: 5000 }).not.toContain(victim?.id);
    await expect.poll(() => pool.workers().length, { timeout: 5000 }).toBe(3);
    expect((await pool.run(claim(1), { deadline: 20 })).status).toBe('ok');
  });

  test('Stop takes back a run that waits, and ends one that runs', async () => {
    // One place, and nobody gives it up: the second run waits for as long as the first one goes on.
    const single = createPool({ size: 1, promptly: 60_000 });
    const stop = new AbortController();
    const runs = [0, 1].map(() => single.run(endless, { deadline: 60, signal: stop.signal }));
    const working = () => single.workers().filter(({ state }) => state === 'working').length;
    await expect.poll(working, { timeout: 10_000 }).toBe(1);
    expect([...single.waiting().values()]).toEqual([1]);
    stop.abort();
    for (const outcome of await Promise.all(runs))
      expect(outcome).toMatchObject({ status: 'failed', error: { message: 'The run was stopped.' } });
    await single.close();
  });
});

test('a pool without an engine fails runs in words, and closes', async () => {
  const pool = createPool({ size: 1, engineFolder: '/nowhere' });
  expect(await pool.run(claim(1), { deadline: 5 })).toMatchObject({ status: 'failed', keep: false });
  await pool.close();
});
