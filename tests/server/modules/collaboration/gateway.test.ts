import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { closeCodes, limits } from '@stillroom/shared/protocol';
import { afterEach, expect, test } from 'vitest';
import { WebSocket } from 'ws';
import { Access, type RoleNow } from '../../../../packages/server/src/modules/collaboration/access.ts';
import { Gateway } from '../../../../packages/server/src/modules/collaboration/gateway.ts';
import { UpdateLog } from '../../../../packages/server/src/modules/collaboration/persistence.ts';
import type { RoomStore } from '../../../../packages/server/src/modules/collaboration/room-store.ts';
import { Room } from '../../../../packages/server/src/modules/collaboration/room.ts';

const person = { id: 'ada', name: 'Ada', initials: 'A', hue: 0 };
const notebook = '00000000-0000-4000-8000-000000000001';
const open: { gateway: Gateway; server: Server }[] = [];
afterEach(() => {
  for (const { gateway, server } of open.splice(0)) {
    gateway.stop();
    server.close();
  }
});

/** Puts a door before a port of this machine until the test has ended. */
async function listen(gateway: Gateway): Promise<number> {
  const server = createServer();
  server.on('upgrade', (request, socket, head) => gateway.upgrade(request, socket, head));
  await new Promise<void>((ready) => server.listen(0, '127.0.0.1', ready));
  open.push({ gateway, server });
  return (server.address() as AddressInfo).port;
}

/** A door before one room in memory; `meanwhile` happens while the room is being loaded. */
async function build(
  meanwhile: (door: { gateway: Gateway; end(): void; setRole(role: RoleNow): void }) => void,
) {
  let stands = true;
  let role: RoleNow = 'author';
  const room = new Room(notebook, new UpdateLog({ query: async () => [] }, 'here'), () => undefined);
  const rooms = {
    async use(_notebook: string, work: (room: Room) => unknown) {
      meanwhile({
        gateway,
        end: () => void (stands = false),
        setRole: (next) => void (role = next),
      });
      return work(room);
    },
    left: () => undefined,
  } as unknown as RoomStore;
  const gateway: Gateway = new Gateway({
    rooms,
    access: new Access(async (places) => places.map(() => role)),
    identify: async () => ({ person, session: 's' }),
    stands: async () => stands,
    isSameOrigin: () => true,
    failed: () => undefined,
  });
  const port = await listen(gateway);
  const line = new WebSocket(`ws://127.0.0.1:${port}/live/${notebook}`);
  const code = await new Promise<number | 'let in'>((resolve) => {
    line.once('close', resolve);
    line.once('message', () => resolve('let in'));
  });
  line.terminate();
  return { code, room };
}

test('whoever may come in is let in', async () => {
  expect((await build(() => undefined)).code).toBe('let in');
});

test('a session that ends while the notebook is being opened lets nobody in', async () => {
  const { code, room } = await build(({ gateway, end }) => {
    end();
    // The news of it comes before the line is on the list.
    gateway.endSessions(person.id, 's', null);
  });
  expect(code).toBe(closeCodes.signedOut);
  expect(room.inhabited).toBe(false);
});

test('a role that is taken away while the notebook is being opened lets nobody in', async () => {
  const { code, room } = await build(({ setRole }) => setRole(null));
  expect(code).toBe(closeCodes.refused);
  expect(room.inhabited).toBe(false);
});

test('more lines at once than can be judged are sent away for a moment, and come in later', async () => {
  let answer: () => void = () => undefined;
  const known = new Promise<void>((resolve) => (answer = resolve));
  const room = new Room(notebook, new UpdateLog({ query: async () => [] }, 'here'), () => undefined);
  const rooms = {
    use: async (_notebook: string, work: (room: Room) => unknown) => work(room),
    left: () => undefined,
  } as unknown as RoomStore;
  const gateway = new Gateway({
    rooms,
    access: new Access(async (places) => places.map(() => 'author' as const)),
    identify: async () => {
      await known;
      return null;
    },
    stands: async () => true,
    isSameOrigin: () => true,
    failed: () => undefined,
  });
  const port = await listen(gateway);
  const knock = () => {
    const line = new WebSocket(`ws://127.0.0.1:${port}/live/${notebook}`);
    return {
      opened: new Promise((resolve) => line.once('open', resolve)),
      closed: new Promise<number>((resolve) => line.once('close', resolve)),
    };
  };
  const waiting = Array.from({ length: limits.linesBefore }, knock);
  await Promise.all(waiting.map(({ opened }) => opened));
  expect(await knock().closed).toBe(closeCodes.later);
  answer();
  for (const { closed } of waiting) expect(await closed).toBe(closeCodes.signedOut);
  expect(await knock().closed).toBe(closeCodes.signedOut);
});
