import { describe, expect, test } from 'vitest';
import * as Y from 'yjs';
import { Access } from '../../../../packages/server/src/modules/collaboration/access.ts';
import { Connection } from '../../../../packages/server/src/modules/collaboration/connection.ts';
import { UpdateLog } from '../../../../packages/server/src/modules/collaboration/persistence.ts';
import type { Room } from '../../../../packages/server/src/modules/collaboration/room.ts';
import {
  RoomStore,
  type RoomStoreOptions,
} from '../../../../packages/server/src/modules/collaboration/room-store.ts';
import { MemoryLine } from '../../../support/memory-line.ts';

const pause = (milliseconds: number) => new Promise<void>((resolve) => setTimeout(resolve, milliseconds));

/** A store over a database that holds one snapshot and counts what is asked of it. */
function build(rest: Partial<RoomStoreOptions> = {}) {
  const doc = new Y.Doc();
  doc.getText('t').insert(0, 'kept');
  const state = Y.encodeStateAsUpdate(doc);
  const asked = { loads: 0, fails: false };
  const query = async (sql: string) => {
    if (!sql.includes('notebook_snapshot')) return [];
    if (asked.fails) throw new Error('no database');
    asked.loads += 1;
    return [{ place: 0, bytes: state }];
  };
  const database = {
    query,
    transaction: <T>(work: (queries: { query: typeof query }) => Promise<T>) => work({ query }),
  };
  const store = new RoomStore({
    database,
    log: new UpdateLog(database, 'here'),
    failed: () => undefined,
    lingering: 20,
    ...rest,
  });
  const join = (room: Room) => {
    const line = new MemoryLine();
    const person = { id: 'ada', name: 'Ada', initials: 'A', hue: 0 };
    const connection = new Connection(
      person,
      room,
      line,
      new Access(async (places) => places.map(() => 'author')),
    );
    connection.join(true);
    return { connection, line };
  };
  return { store, asked, join };
}

describe('the rooms of a process', () => {
  test('are loaded once, however many come in at once', async () => {
    const { store, asked } = build();
    const texts = await Promise.all(
      [1, 2, 3].map(() => store.use('n', (room) => room.doc.getText('t').toString())),
    );
    expect(texts).toEqual(['kept', 'kept', 'kept']);
    expect(asked.loads).toBe(1);
  });

  test('stay while somebody is there, and go some time after the last has left', async () => {
    const { store, join } = build();
    const { connection, room } = await store.use('n', (opened) => ({ room: opened, ...join(opened) }));
    await pause(60);
    expect(await store.peek('n')).toBe(room);
    connection.left();
    store.left(room);
    expect(await store.peek('n')).toBe(room);
    await pause(60);
    expect(await store.peek('n')).toBeNull();
  });

  test('stay while something goes on in them', async () => {
    const { store } = build();
    const work = { busy: true };
    await store.use('n', (room) =>
      room.observe({
        get busy() {
          return work.busy;
        },
      }),
    );
    await pause(80);
    expect(await store.peek('n')).not.toBeNull();
    work.busy = false;
    await pause(80);
    expect(await store.peek('n')).toBeNull();
  });

  test('that cannot be loaded are tried again by the next', async () => {
    const { store, asked } = build();
    asked.fails = true;
    await expect(store.use('n', () => undefined)).rejects.toThrow('no database');
    asked.fails = false;
    expect(await store.use('n', (room) => room.doc.getText('t').toString())).toBe('kept');
  });

  test('are told before they go, and all lines end when the process stops', async () => {
    const told: string[] = [];
    const { store, join } = build({
      opened: (room) =>
        room.observe({
          closing: async () => void told.push('closing'),
          closed: () => void told.push('closed'),
        }),
    });
    const { line } = await store.use('n', join);
    await store.stop();
    expect(told).toEqual(['closing', 'closed']);
    expect(line.closed?.code).toBe(4503);
  });

  test('whose log failed are dropped: lines end, and the next comes to what is kept', async () => {
    const { store, join, asked } = build();
    const { room, line } = await store.use('n', (opened) => ({ room: opened, ...join(opened) }));
    room.abandon();
    expect(line.closed?.code).toBe(4503);
    await store.use('n', (again) => expect(again).not.toBe(room));
    expect(asked.loads).toBe(2);
  });
});
