import { randomUUID } from 'node:crypto';
import { readFileSync } from 'node:fs';
import type { GroupView } from '@stillroom/shared/contracts';
import { abilities, groupRoles, may, type Membership, roleAt } from '@stillroom/shared/roles';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { messageAbilities } from '../../../packages/server/src/modules/collaboration/index.ts';
import { buildPerson, signIn } from '../../support/build.ts';
import { startTestServer, type TestServer } from '../../support/server.ts';
import { sourcesUnder } from '../../support/sources.ts';
import { type Answer, Visitor } from '../../support/visitor.ts';
import { buildFixture, type Caller, callers, type Crowd, type Fixture, gatherCrowd } from './fixture.ts';
import {
  type GuardedRoute,
  guardedRoutes,
  type LinkRoute,
  linkRoutes,
  openRoutes,
  operatorRoutes,
  ownRoutes,
} from './routes.ts';

let server: TestServer;
let crowd: Crowd;
beforeAll(async () => {
  server = await startTestServer();
  crowd = await gatherCrowd(server);
});
afterAll(() => server.stop());

function ask(route: GuardedRoute, fixture: Fixture, caller: Caller): Promise<Answer> {
  const parts: Record<string, string> = {
    group: fixture.group,
    notebook: fixture.notebook,
    record: fixture.record,
    ...route.parts?.(fixture, caller),
  };
  const path = route.address.replace(/:(\w+)/gu, (_whole, name: string) => parts[name] ?? 'missing');
  return crowd.visitors[caller].send(route.method, path, route.body?.(fixture));
}

/** What the door said: let in, or why not. What happens behind it is for other tests. */
function doorOf({ status, body }: Answer, door: string): string {
  if (status >= 500) return `broken: ${JSON.stringify(body)}`;
  if (status === 401) return 'signed out';
  if (status === 403) return 'forbidden';
  const words = (body as { message?: string } | null)?.message ?? '';
  if (words.startsWith('There is no such address')) return 'no such route';
  return status === 404 && words.startsWith(`There is no such ${door},`) ? 'not there' : 'in';
}

function expectedDoor(
  route: GuardedRoute,
  caller: Caller,
  membership: (role: Caller) => Membership | null,
): string {
  if (caller === 'nobody') return 'signed out';
  const held = membership(caller);
  const role = held === null || route.door === 'group' ? (held?.role ?? null) : roleAt(held, 'the notebook');
  if (role === null) return 'not there';
  return may(role, route.ability) ? 'in' : 'forbidden';
}

const memberOf =
  (notebooks: readonly string[] | null) =>
  (caller: Caller): Membership | null =>
    caller === 'outsider' || caller === 'nobody' ? null : { role: caller, notebooks };

/** What somebody's role says of the installation: nothing. */
const asStanding = (caller: Caller) => (caller === 'outsider' || caller === 'nobody' ? null : caller);

const words = ({ method, address, ability }: GuardedRoute) => `${method} ${address} (${ability})`;

describe('every route of groups, notebooks and records asks the role table', () => {
  test.each(guardedRoutes.map((route) => [words(route), route] as const))('%s', async (_words, route) => {
    for (const caller of callers) {
      const fixture = await buildFixture(server, crowd);
      const answer = await ask(route, fixture, caller);
      expect(doorOf(answer, route.door), `${caller}: ${JSON.stringify(answer.body)}`).toBe(
        expectedDoor(route, caller, memberOf(null)),
      );
    }
  });
});

describe('a role limited to other notebooks does not count at this one or its records', () => {
  const elsewhere = ['00000000-0000-4000-8000-00000000000a'];
  const routes = guardedRoutes.filter(({ door }) => door !== 'group');
  test.each(routes.map((route) => [words(route), route] as const))('%s', async (_words, route) => {
    const fixture = await buildFixture(server, crowd, () => elsewhere);
    for (const caller of callers) {
      const answer = await ask(route, fixture, caller);
      expect(doorOf(answer, route.door), caller).toBe(expectedDoor(route, caller, memberOf(elsewhere)));
    }
  });

  test('and begins no notebook, which would lie outside them', async () => {
    const { group } = await buildFixture(server, crowd, () => elsewhere);
    const answer = await crowd.visitors.author.post(`/api/groups/${group}/notebooks`, { title: 'New' });
    expect(answer).toMatchObject({
      status: 403,
      body: { message: expect.stringContaining('chosen') as string },
    });
  });

  test('and its records are not told of in the group', async () => {
    for (const [chosen, count] of [
      [() => elsewhere, 0],
      [(notebook: string) => [notebook], 1],
    ] as const) {
      const { group } = await buildFixture(server, crowd, (notebook) => [...chosen(notebook)]);
      const { body } = await crowd.visitors.reader.get(`/api/groups/${group}`);
      expect((body as GroupView).records).toHaveLength(count);
    }
  });
});

describe('a role limited to chosen notebooks counts at one of them and its records', () => {
  const routes = guardedRoutes.filter(({ door }) => door !== 'group');
  test.each(routes.map((route) => [words(route), route] as const))('%s', async (_words, route) => {
    for (const caller of groupRoles) {
      const fixture = await buildFixture(server, crowd, (notebook) => [notebook]);
      const answer = await ask(route, fixture, caller);
      expect(doorOf(answer, route.door), `${caller}: ${JSON.stringify(answer.body)}`).toBe(
        expectedDoor(route, caller, memberOf(null)),
      );
    }
  });
});

describe('the operator’s room', () => {
  test.each(operatorRoutes.map((route) => [`${route.method} ${route.address}`, route] as const))(
    '%s',
    async (_words, { method, address, ability, body }) => {
      const operator = await signIn(server, await buildPerson(server, { operator: true }));
      const path = address.replace(/:\w+/gu, () => randomUUID());
      const send = (visitor: Visitor) => visitor.send(method, path, body?.({} as Fixture));
      // What has an id in its address is not there; that is said to nobody else.
      expect((await send(operator)).status).toBe(path === address ? 200 : 404);
      for (const caller of callers) {
        const { status } = await send(crowd.visitors[caller]);
        expect(status, caller).toBe(caller === 'nobody' ? 401 : may(asStanding(caller), ability) ? 200 : 403);
      }
    },
  );

  test('being operator opens no group', async () => {
    const operator = await signIn(server, await buildPerson(server, { operator: true }));
    const { group, notebook } = await buildFixture(server, crowd);
    expect((await operator.get(`/api/groups/${group}`)).status).toBe(404);
    expect((await operator.get(`/api/notebooks/${notebook}`)).status).toBe(404);
  });
});

describe('routes about oneself', () => {
  test.each(ownRoutes)('%s needs an account', async (route) => {
    const [method = '', address = ''] = route.split(' ');
    const path = address.replace(/:\w+/u, 'anything');
    const { status, body } = await new Visitor(server.url).send(method, path);
    expect([status, body]).toMatchObject([401, { error: 'signed-out' }]);
  });
});

describe('links', () => {
  const through = (visitor: Visitor, { method, address, body }: LinkRoute, token: string) =>
    visitor.send(
      method,
      address.replace(':token', token).replace(/:\w+/gu, () => randomUUID()),
      body,
    );
  const gone = [410, { error: 'gone', hint: expect.any(String) as string }];

  test.each([...linkRoutes.map((route) => [`${route.method} ${route.address}`, route] as const)])(
    '%s opens with its own secret what the table says, and with no other',
    async (_words, route) => {
      const { links } = await buildFixture(server, crowd);
      const visitors = { nobody: new Visitor(server.url), outsider: crowd.visitors.outsider };
      const others = Object.entries(links).flatMap(([link, token]) => (link === route.link ? [] : [token]));
      for (const token of [...others, 'x'.repeat(43)]) {
        const { status, body } = await through(visitors.nobody, route, token);
        expect([status, body], token).toMatchObject(gone);
      }
      expect(may(route.standing, route.ability)).toBe(true);
      // Whoever is signed in with the link stands where the link says, no more and no less.
      for (const visitor of [visitors.nobody, visitors.outsider]) {
        const { links: fresh } = await buildFixture(server, crowd);
        const { status, body } = await through(visitor, route, fresh[route.link]);
        expect(status, JSON.stringify(body)).toBe(route.good);
      }
    },
  );

  test('an invitation opens nothing with a secret that nobody was given', async () => {
    const { status, body } = await new Visitor(server.url).get(`/api/invitations/${'x'.repeat(43)}`);
    expect([status, body]).toMatchObject(gone);
  });

  test('a reviewer’s or a public link is no way into the group, its notebook or its other doors', async () => {
    const fixture = await buildFixture(server, crowd);
    const paths = [
      `/api/groups/${fixture.group}`,
      `/api/notebooks/${fixture.notebook}`,
      `/api/records/${fixture.record}`,
    ];
    for (const token of Object.values(fixture.links))
      for (const path of paths) {
        const answer = await new Visitor(server.url).get(`${path}?token=${token}`);
        expect(answer.status, path).toBe(401);
      }
  });
});

describe('the list of addresses', () => {
  const known = [
    ...[...guardedRoutes, ...operatorRoutes, ...linkRoutes].map(
      ({ method, address }) => `${method} ${address}`,
    ),
    ...ownRoutes,
    ...openRoutes,
  ];
  const sorted = (routes: Iterable<string>) => [...new Set(routes)].sort();

  test('names the routes that these tests know, all of them', () => {
    expect(sorted(listedRoutes())).toEqual(sorted(known));
  });

  test('names the routes that the server has, all of them', () => {
    expect(sorted(listedRoutes())).toEqual(sorted(servedRoutes()));
  });

  test('and the messages of a live line ask everything that is in the role table', () => {
    const asked = [
      ...[...guardedRoutes, ...operatorRoutes, ...linkRoutes].map(({ ability }) => ability),
      ...Object.values(messageAbilities),
    ];
    const unasked = abilities.filter((ability) => !asked.includes(ability));
    // What these say travels with what is read: the members, results of a record, and what came back on it.
    expect(unasked).toEqual(['group.members.read', 'record.results', 'record.reviews.read']);
  });
});

/** The routes as the server's sources write them. */
function servedRoutes(): string[] {
  const written = /\brout\w+\.(get|post|put|patch|delete)\(\s*'(\/api\/[^']+)'/gu;
  return sourcesUnder('packages/server/src').flatMap(({ text }) =>
    [...text.matchAll(written)].map(([, method = '', address = '']) => `${method.toUpperCase()} ${address}`),
  );
}

/** The routes of the contract's table: "GET, PATCH /api/account" is two, "…/health, people" as many as there are words. */
function listedRoutes(): string[] {
  const readme = new URL('../../../packages/shared/src/contracts/README.md', import.meta.url);
  const rows = readFileSync(readme, 'utf8').matchAll(/^\| ([A-Z, ]+) (\/api\/[^|]+?) \|/gmu);
  return [...rows].flatMap(([, methods = '', addresses = '']) => {
    const [first = '', ...more] = addresses.replace(/\?.*$/u, '').split(', ');
    const paths = [first, ...more.map((last) => first.replace(/[^/]+$/u, last))];
    return methods.split(', ').flatMap((method) => paths.map((path) => `${method} ${path}`));
  });
}
