import { randomUUID } from 'node:crypto';
import { readFileSync } from 'node:fs';
import type { GroupView } from '@stillroom/shared/contracts';
import { may, type Membership, roleAt } from '@stillroom/shared/roles';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { buildPerson, signIn } from '../../support/build.ts';
import { startTestServer, type TestServer } from '../../support/server.ts';
import { type Answer, Visitor } from '../../support/visitor.ts';
import { buildFixture, type Caller, callers, type Crowd, type Fixture, gatherCrowd } from './fixture.ts';
import { type GuardedRoute, guardedRoutes, openRoutes, operatorRoutes, ownRoutes } from './routes.ts';

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

  test('and counts at a chosen one', async () => {
    const fixture = await buildFixture(server, crowd, (notebook) => [notebook]);
    const { status } = await crowd.visitors.reader.get(`/api/notebooks/${fixture.notebook}`);
    expect(status).toBe(200);
  });
});

describe('the operator’s room', () => {
  test.each(operatorRoutes.map((route) => [`${route.method} ${route.address}`, route] as const))(
    '%s',
    async (_words, { method, address, body }) => {
      const operator = await signIn(server, await buildPerson(server, { operator: true }));
      const path = address.replace(/:\w+/gu, () => randomUUID());
      const send = (visitor: Visitor) => visitor.send(method, path, body?.({} as Fixture));
      // What has an id in its address is not there; that is said to nobody else.
      expect((await send(operator)).status).toBe(path === address ? 200 : 404);
      expect((await send(crowd.visitors.lead)).status).toBe(403);
      expect((await send(crowd.visitors.nobody)).status).toBe(401);
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
  const links = openRoutes.filter((route) => /^GET .*:token/u.test(route));
  test.each(links)('%s opens nothing with a secret that nobody was given', async (route) => {
    const path = route.replace('GET ', '').replace(':token', 'x'.repeat(43));
    const { status, body } = await new Visitor(server.url).get(path.replace(/:\w+/gu, () => randomUUID()));
    expect([status, body]).toMatchObject([410, { error: 'gone', hint: expect.any(String) as string }]);
  });
});

describe('the list of addresses', () => {
  test('names no route that these tests do not know', () => {
    const known = new Set([
      ...[...guardedRoutes, ...operatorRoutes].map(({ method, address }) => `${method} ${address}`),
      ...ownRoutes,
      ...openRoutes,
    ]);
    expect(listedRoutes().filter((route) => !known.has(route))).toEqual([]);
  });
});

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
