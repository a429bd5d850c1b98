import type { Person } from '@stillroom/shared/contracts';
import { closeCodes, messageTypes } from '@stillroom/shared/protocol';
import { describe, expect, test } from 'vitest';
import * as Y from 'yjs';
import { Access, type RoleNow } from '../../../../packages/server/src/modules/collaboration/access.ts';
import { Connection } from '../../../../packages/server/src/modules/collaboration/connection.ts';
import { UpdateLog } from '../../../../packages/server/src/modules/collaboration/persistence.ts';
import { Room } from '../../../../packages/server/src/modules/collaboration/room.ts';
import { frames } from '../../../support/live-frames.ts';
import { MemoryLine } from '../../../support/memory-line.ts';

const person = (id: string): Person => ({ id, name: id, initials: id.slice(0, 1), hue: 0 });
const turns = async (count = 6) => {
  for (let turn = 0; turn < count; turn += 1) await new Promise((resolve) => setImmediate(resolve));
};

/** A room in memory whose commits are held back until they are let go, and whose roles can be set. */
function build() {
  const held: (() => void)[] = [];
  const roles = new Map<string, RoleNow>();
  const broken: Room[] = [];
  const queries = { query: () => new Promise<unknown>((resolve) => held.push(() => resolve([]))) };
  const room = new Room('n', new UpdateLog(queries, 'here'), (lost) => broken.push(lost));
  const access = new Access(async (places) => places.map((place) => roles.get(place.person) ?? null));
  const join = (id: string, role: RoleNow = 'author') => {
    roles.set(id, role);
    const line = new MemoryLine();
    const connection = new Connection(person(id), room, line, access);
    connection.join(role === 'author');
    return { connection, line };
  };
  const commit = async () => {
    for (const release of held.splice(0)) release();
    await turns();
  };
  const change = (id: string, role: RoleNow) => void roles.set(id, role);
  return { room, join, commit, change, broken };
}

function edit(words: string, doc = new Y.Doc()): Uint8Array {
  const before = Y.encodeStateVector(doc);
  doc.getText('t').insert(0, words);
  return Y.encodeStateAsUpdate(doc, before);
}

describe('an update that breaks off', () => {
  test('ends its line, and the room where a part of it was taken in', async () => {
    const { join, broken, room } = build();
    const ada = join('ada');
    ada.connection.receive(frames.update(new Uint8Array([9, 9])));
    await turns();
    expect(ada.line.closed?.code).toBe(closeCodes.malformed);
    expect(broken).toEqual([]);
    const ben = join('ben');
    ben.connection.receive(frames.update(edit('hello').slice(0, -1)));
    await turns();
    expect(ben.line.closed?.code).toBe(closeCodes.malformed);
    expect(broken).toEqual([room]);
  });
});

describe('a presence', () => {
  test('is that of a few windows, however many a line names', async () => {
    const { join, room } = build();
    const ada = join('ada');
    for (let client = 1; client <= 100; client += 1)
      ada.connection.receive(frames.awareness(client, { user: { id: 'ada' } }));
    await turns();
    const shown = join('ben').line.ofType(messageTypes.awareness).at(0);
    expect(shown?.length).toBeGreaterThan(20);
    expect(shown?.length).toBeLessThan(500);
    expect(room.inhabited).toBe(true);
  });
});

describe('a line', () => {
  test('asks somebody who may write for what the server lacks, and a reader for nothing', () => {
    const { join } = build();
    expect(join('ada').line.ofType(messageTypes.sync)).toHaveLength(1);
    expect(join('rita', 'reader').line.ofType(messageTypes.sync)).toHaveLength(0);
  });

  test('relays an edit at once and acknowledges it when it is committed', async () => {
    const { join, commit, room } = build();
    const [ada, ben] = [join('ada'), join('ben')];
    const before = ben.line.ofType(messageTypes.sync).length;
    ada.connection.receive(frames.update(edit('hello')));
    await turns();
    expect(room.doc.getText('t').toString()).toBe('hello');
    expect(ben.line.ofType(messageTypes.sync)).toHaveLength(before + 1);
    expect(ada.line.ofType(messageTypes.sync)).toHaveLength(1);
    expect(ada.line.kept).toBe(0);
    await commit();
    expect(ada.line.kept).toBe(1);
    expect(ben.line.kept).toBe(0);
  });

  test('acknowledges what changes nothing only after what it repeats is committed', async () => {
    const { join, commit } = build();
    const [ada, ben] = [join('ada'), join('ben')];
    const update = edit('once');
    ada.connection.receive(frames.update(update));
    await turns();
    ben.connection.receive(frames.update(update));
    await turns();
    expect(ben.line.kept).toBe(0);
    await commit();
    expect(ben.line.kept).toBe(1);
  });

  test('keeps an update that waits for another one, and shows it when that comes', async () => {
    const { join, commit, room } = build();
    const doc = new Y.Doc();
    const [first, second] = [edit('a', doc), edit('b', doc)];
    const ada = join('ada');
    ada.connection.receive(frames.update(second));
    await turns();
    expect(room.doc.getText('t').toString()).toBe('');
    expect(room.rows).toBe(1);
    ada.connection.receive(frames.update(first));
    await turns();
    await commit();
    await commit();
    expect(room.doc.getText('t').toString()).toBe('ba');
    expect(ada.line.kept).toBe(2);
  });

  test('ends with the first refusal; what was sent after it is not looked at', async () => {
    const { join, change, room } = build();
    const ada = join('ada');
    const doc = new Y.Doc();
    ada.connection.receive(frames.update(edit('taken', doc)));
    await turns();
    change('ada', 'reader');
    ada.connection.receive(frames.update(edit('refused ', doc)));
    ada.connection.receive(frames.update(edit('after it ', doc)));
    await turns();
    change('ada', 'author');
    await turns();
    expect(ada.line.closed).toMatchObject({ code: closeCodes.refused });
    expect(room.doc.getText('t').toString()).toBe('taken');
    expect(room.people).toEqual([]);
  });

  test('takes a reader’s empty answer, and counts it', async () => {
    const { join, commit } = build();
    const rita = join('rita', 'reader');
    rita.connection.receive(frames.step2(new Uint8Array([0, 0])));
    await turns();
    await commit();
    expect(rita.line.closed).toBeNull();
    expect(rita.line.kept).toBe(1);
  });

  test('that sends without end is ended', () => {
    const { join } = build();
    const ada = join('ada');
    for (let frame = 0; frame < 4500; frame += 1)
      ada.connection.receive(frames.step2(new Uint8Array([0, 0])));
    expect(ada.line.closed).toMatchObject({ code: closeCodes.tooMuch });
  });

  test('whose edit could not be committed gives the room up', async () => {
    const broken: Room[] = [];
    const log = new UpdateLog({ query: () => Promise.reject(new Error('disk full')) }, 'here');
    const room = new Room('n', log, (lost) => broken.push(lost));
    const line = new MemoryLine();
    const ada = new Connection(
      person('ada'),
      room,
      line,
      new Access(async (places) => places.map(() => 'author')),
    );
    ada.join(true);
    ada.receive(frames.update(edit('lost')));
    await turns();
    expect(broken).toEqual([room]);
    expect(line.kept).toBe(0);
  });
});

describe('who is here', () => {
  test('each person once, until the last of their lines is gone', () => {
    const { join, room } = build();
    const [one, two] = [join('ada'), join('ada')];
    join('ben');
    expect(room.people.map(({ id }) => id)).toEqual(['ada', 'ben']);
    one.connection.left();
    expect(room.people.map(({ id }) => id)).toEqual(['ada', 'ben']);
    two.connection.left();
    expect(room.people.map(({ id }) => id)).toEqual(['ben']);
  });

  test('a state shown by one goes with them, and what others send on of it does not stay', async () => {
    const { join } = build();
    const [ada, ben] = [join('ada'), join('ben')];
    ada.connection.receive(frames.awareness(1, { user: { id: 'ada' } }));
    await turns();
    ben.connection.receive(frames.awareness(1, { user: { id: 'ada' } }));
    await turns();
    expect(ben.line.closed).toBeNull();
    const before = ben.line.ofType(messageTypes.awareness).length;
    ada.connection.left();
    expect(ben.line.ofType(messageTypes.awareness)).toHaveLength(before + 1);
    expect(new TextDecoder().decode(ben.line.ofType(messageTypes.awareness).at(-1))).toContain('null');
  });
});
