import { randomUUID } from 'node:crypto';
import type { IncomingMessage } from 'node:http';
import type { NoticeTopic } from '@stillroom/shared/protocol';
import { openConnections } from '../../database/connections.ts';
import { announce } from '../../events.ts';
import { isSameOrigin } from '../../http/origin.ts';
import { describeError } from '../../logger.ts';
import type { ServerModule, Services } from '../../services.ts';
import { readRoles } from '../notebooks/index.ts';
import { Access } from './access.ts';
import { takeInAll, takeInKept } from './elsewhere.ts';
import { noticeFrame } from './frames.ts';
import { Gateway, type Visitor } from './gateway.ts';
import { PeopleElsewhere } from './people-elsewhere.ts';
import { UpdateLog } from './persistence.ts';
import { PresenceCourier, type Tell } from './presence-courier.ts';
import { RoomStore } from './room-store.ts';
import type { Room } from './room.ts';

export { Connection, messageAbilities } from './connection.ts';
export type { Visitor } from './gateway.ts';
export type { Occupant } from './occupant.ts';
export type { RoomStore } from './room-store.ts';
export { Room } from './room.ts';
export type { RoomObserver } from './room.ts';

export interface Collaboration extends ServerModule {
  readonly rooms: RoomStore;
}

/** What live editing needs to know from others. */
export interface CollaborationOptions {
  /** The person signed in by the session of an upgrade request; null where nobody is. */
  readonly readPerson: (request: IncomingMessage) => Promise<Visitor | null>;
  /** Whether a session, by its name, still stands. */
  readonly sessionStands: (person: string, session: string) => Promise<boolean>;
  /** Called with each room that opens, before anybody is let in: the planner's place. */
  readonly opened?: (room: Room) => void;
}

/** Live editing: the door, the rooms and their log, and what news from elsewhere does to them. */
export function createCollaboration(services: Services, options: CollaborationOptions): Collaboration {
  const { config, database, events, log } = services;
  const origin = randomUUID();
  const failed = (words: string, error: unknown) => log.error(words, describeError(error));
  // One INSERT and one read of roles run at a time; one more stands by while a broken one is being replaced.
  const connections = openConnections(config.DATABASE_URL, log, {
    name: 'stillroom log',
    most: 3,
    durable: true,
  });
  const access = new Access((places) => readRoles(connections, places));
  const elsewhere = new PeopleElsewhere();
  const couriers = new Map<string, PresenceCourier>();
  const telling = new Set<Promise<void>>();
  const tellProcesses: Tell = (name, payload) => {
    const told = announce(database.manager, name, payload)
      .catch((error: unknown) =>
        log.warn('Other processes could not be told who is here.', describeError(error)),
      )
      .finally(() => telling.delete(told));
    telling.add(told);
  };
  const rooms = new RoomStore({
    database,
    log: new UpdateLog(connections, origin),
    failed,
    elsewhere: (notebook) => elsewhere.at(notebook),
    opened(room) {
      const courier = new PresenceCourier({ room, origin, elsewhere, tell: tellProcesses });
      couriers.set(room.notebook, courier);
      room.observe(courier);
      room.observe({
        closed() {
          if (couriers.get(room.notebook) === courier) couriers.delete(room.notebook);
        },
      });
      options.opened?.(room);
    },
  });
  const gateway = new Gateway({
    rooms,
    access,
    identify: async (request) => asVisitor(await options.readPerson(request)),
    stands: ({ person, session }) => options.sessionStands(person.id, session),
    isSameOrigin: (request) => isSameOrigin(request, config),
    failed,
  });

  const judge = (connections: Iterable<{ reconsider(): Promise<void> }>) => {
    for (const connection of connections)
      void connection
        .reconsider()
        .catch((error: unknown) => failed('A line could not be judged anew.', error));
  };
  const tell = async (notebook: string, topic: NoticeTopic) =>
    (await rooms.peek(notebook))?.send(noticeFrame({ topic }), null);

  const listeners = [
    events.on('access.changed', ({ person }) => {
      judge(gateway.connections(person));
    }),
    events.on('session.ended', ({ person, session, except }) => gateway.endSessions(person, session, except)),
    events.on('notebook.changed', ({ notebook }) => {
      void rooms.peek(notebook).then((room) => judge(room?.connections ?? []));
      void tell(notebook, 'notebook');
    }),
    events.on('remarks.changed', ({ notebook }) => void tell(notebook, 'remarks')),
    events.on('records.changed', ({ notebook }) => void tell(notebook, 'records')),
    events.on('updates.kept', (news) => {
      if (news.from === origin) return;
      void rooms
        .peek(news.notebook)
        .then((room) => room && takeInKept(database, room, news))
        .catch((error: unknown) => failed('Updates of another process could not be read.', error));
    }),
    events.on('people.here', ({ from, notebook, people }) => {
      if (from !== origin && elsewhere.hear(from, notebook, people)) couriers.get(notebook)?.introduce();
    }),
    events.on('presence.moved', ({ from, notebook, states }) => {
      if (from !== origin) void rooms.peek(notebook).then((room) => room?.presentElsewhere(states));
    }),
    events.onGap(() => {
      judge(gateway.connections());
      void rooms
        .rooms()
        .then((open) => Promise.all(open.map((room) => takeInAll(database, room))))
        .catch((error: unknown) => failed('What happened while the line was down could not be read.', error));
    }),
  ];

  return {
    rooms,
    upgrade: (request, socket, head) => gateway.upgrade(request, socket, head),
    async stop() {
      for (const unlisten of listeners) unlisten();
      gateway.stop();
      await rooms.stop();
      await Promise.all(telling);
      await connections.end();
    },
  };
}

/** Everybody in a room sees a visitor as others see a person: no address. */
function asVisitor(visitor: Visitor | null): Visitor | null {
  if (visitor === null) return null;
  const { id, name, initials, hue } = visitor.person;
  return { person: { id, name, initials, hue }, session: visitor.session };
}
