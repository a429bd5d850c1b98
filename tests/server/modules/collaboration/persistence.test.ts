import { describe, expect, test } from 'vitest';
import { UpdateLog } from '../../../../packages/server/src/modules/collaboration/persistence.ts';

/** A log over a database that answers when it is told to. */
function build() {
  const batches: { rows: readonly number[]; commit: () => void; fail: (error: Error) => void }[] = [];
  const queries = {
    query: (_sql: string, parameters: unknown[] = []) =>
      new Promise<unknown>((resolve, reject) => {
        const bytes = parameters[2] as Buffer[];
        batches.push({
          rows: bytes.map((update) => update[0] ?? 0),
          commit: () => resolve([]),
          fail: reject,
        });
      }),
  };
  return { log: new UpdateLog(queries, 'here'), batches };
}

const update = (byte: number) => new Uint8Array([byte]);
const turn = () => new Promise<void>((resolve) => setImmediate(resolve));

describe('the log of updates', () => {
  test('writes the first at once, and what came meanwhile as one batch after it, in order', async () => {
    const { log, batches } = build();
    for (const byte of [1, 2, 3]) void log.append('n', 'ada', update(byte));
    expect(batches.map(({ rows }) => rows)).toEqual([[1]]);
    batches[0]?.commit();
    await turn();
    expect(batches.map(({ rows }) => rows)).toEqual([[1], [2, 3]]);
  });

  test('acknowledges nothing before its own commit', async () => {
    const { log, batches } = build();
    const done: number[] = [];
    for (const byte of [1, 2]) void log.append('n', 'ada', update(byte)).then(() => done.push(byte));
    await turn();
    expect(done).toEqual([]);
    batches[0]?.commit();
    await turn();
    expect(done).toEqual([1]);
    batches[1]?.commit();
    await turn();
    expect(done).toEqual([1, 2]);
  });

  test('a batch that the database refuses fails alone, and the log goes on', async () => {
    const { log, batches } = build();
    const first = log.append('n', 'ada', update(1));
    const second = log.append('n', 'ada', update(2));
    batches[0]?.fail(new Error('disk full'));
    await expect(first).rejects.toThrow('disk full');
    await turn();
    batches[1]?.commit();
    await expect(second).resolves.toBeUndefined();
  });

  test('bounds a batch by rows and by bytes', async () => {
    const { log, batches } = build();
    void log.append('n', 'ada', update(0));
    for (let row = 0; row < 1500; row += 1) void log.append('n', 'ada', update(1));
    for (let row = 0; row < 3; row += 1) void log.append('n', 'ada', new Uint8Array(3 * 1024 * 1024));
    for (let at = 0; at < 6; at += 1) {
      batches[at]?.commit();
      await turn();
    }
    expect(batches.map(({ rows }) => rows.length)).toEqual([1, 1000, 502, 1]);
  });
});
