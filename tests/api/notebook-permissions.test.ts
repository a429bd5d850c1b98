import type { Me } from '@stillroom/shared/contracts';
import { type Ability, type GroupRole, groupRoles, may } from '@stillroom/shared/roles';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { type Compute, ResultStore } from '../../packages/server/src/modules/compute/index.ts';
import { computeRoutes } from '../../packages/server/src/modules/compute/compute.routes.ts';
import { filesRoutes } from '../../packages/server/src/modules/notebooks/files.routes.ts';
import { notebooksRoutes } from '../../packages/server/src/modules/notebooks/notebooks.routes.ts';
import { remarksRoutes } from '../../packages/server/src/modules/notebooks/remarks.routes.ts';
import { recordsRoutes } from '../../packages/server/src/modules/records/records.routes.ts';
import { reviewsRoutes } from '../../packages/server/src/modules/reviews/reviews.routes.ts';
import { buildGroup, buildMember, buildPerson, signIn } from '../support/build.ts';
import { buildNotebook, cell } from '../support/live.ts';
import { startTestServer, type TestServer } from '../support/server.ts';
import { Visitor } from '../support/visitor.ts';

/** What a request finds in place: everything is made anew for each, so that none spoils another's. */
interface Place {
  readonly group: string;
  readonly notebook: string;
  readonly binned: string;
  readonly remark: string;
  readonly record: string;
  readonly review: string;
  readonly digest: string;
}

interface Door {
  readonly method: string;
  readonly path: (place: Place) => string;
  readonly ability: Ability;
  readonly body?: () => unknown;
}

const tomorrow = new Date(Date.now() + 86_400_000).toISOString().slice(0, 10);
const remark = () => ({ cell: 'yeast', quote: '', text: 'Words.' });
const picture = () => {
  const form = new FormData();
  form.set('picture', new Blob(['no picture']), 'a.png');
  return form;
};

/** Every door of notebooks, engine, records and reviews that members use, with what the role table asks for it. */
const doors: readonly Door[] = [
  {
    method: 'POST',
    path: ({ group }) => `/api/groups/${group}/notebooks`,
    ability: 'notebook.create',
    body: () => ({ title: 'New' }),
  },
  {
    method: 'POST',
    path: ({ group }) => `/api/groups/${group}/notebook-files`,
    ability: 'notebook.create',
    body: () => ({ format: 'stillroom-notebook/1', cells: [] }),
  },
  { method: 'GET', path: ({ notebook }) => `/api/notebooks/${notebook}`, ability: 'notebook.read' },
  { method: 'DELETE', path: ({ notebook }) => `/api/notebooks/${notebook}`, ability: 'notebook.delete' },
  { method: 'POST', path: ({ binned }) => `/api/notebooks/${binned}/restore`, ability: 'notebook.restore' },
  {
    method: 'PUT',
    path: ({ notebook }) => `/api/notebooks/${notebook}/public`,
    ability: 'notebook.publish',
    body: () => ({ public: true }),
  },
  { method: 'GET', path: ({ notebook }) => `/api/notebooks/${notebook}/file`, ability: 'notebook.export' },
  { method: 'GET', path: ({ notebook }) => `/api/notebooks/${notebook}/fair-copy`, ability: 'notebook.read' },
  {
    method: 'GET',
    path: ({ notebook, digest }) => `/api/notebooks/${notebook}/results/${digest}`,
    ability: 'notebook.read',
  },
  { method: 'POST', path: ({ notebook }) => `/api/notebooks/${notebook}/run`, ability: 'notebook.run' },
  {
    method: 'POST',
    path: ({ notebook }) => `/api/notebooks/${notebook}/cells/yeast/run`,
    ability: 'notebook.run',
  },
  {
    method: 'POST',
    path: ({ notebook }) => `/api/notebooks/${notebook}/cells/yeast/stop`,
    ability: 'notebook.run',
  },
  { method: 'GET', path: ({ notebook }) => `/api/notebooks/${notebook}/remarks`, ability: 'notebook.read' },
  {
    method: 'POST',
    path: ({ notebook }) => `/api/notebooks/${notebook}/remarks`,
    ability: 'notebook.remark',
    body: remark,
  },
  {
    method: 'POST',
    path: (place) => `/api/notebooks/${place.notebook}/remarks/${place.remark}/answers`,
    ability: 'notebook.remark',
    body: () => ({ text: 'Words.' }),
  },
  {
    method: 'PATCH',
    path: (place) => `/api/notebooks/${place.notebook}/remarks/${place.remark}`,
    ability: 'notebook.settle',
    body: () => ({ settled: true }),
  },
  {
    method: 'POST',
    path: ({ notebook }) => `/api/notebooks/${notebook}/pictures`,
    ability: 'notebook.edit',
    body: picture,
  },
  { method: 'GET', path: ({ notebook }) => `/api/notebooks/${notebook}/freeze`, ability: 'notebook.freeze' },
  {
    method: 'POST',
    path: ({ notebook }) => `/api/notebooks/${notebook}/freeze`,
    ability: 'notebook.freeze',
    body: () => ({ reasons: { remarks: 'Open on purpose.' } }),
  },
  { method: 'GET', path: ({ record }) => `/api/records/${record}`, ability: 'record.read' },
  { method: 'GET', path: ({ record }) => `/api/records/${record}/file`, ability: 'record.export' },
  {
    method: 'PUT',
    path: ({ record }) => `/api/records/${record}/public`,
    ability: 'notebook.publish',
    body: () => ({ public: false }),
  },
  {
    method: 'POST',
    path: ({ record }) => `/api/records/${record}/reviews`,
    ability: 'record.invite',
    body: () => ({ email: 'referee@example.org', name: '', masked: true, until: tomorrow, message: '' }),
  },
  {
    method: 'DELETE',
    path: ({ record, review }) => `/api/records/${record}/reviews/${review}`,
    ability: 'record.withdraw',
  },
];

let server: TestServer;
let lead: Me;
let asLead: Visitor;
let place: Place;
const visitors = new Map<GroupRole | 'stranger' | 'limited', Visitor>();

beforeAll(async () => {
  server = await startTestServer();
  lead = await buildPerson(server);
  const group = await buildGroup(server, lead);
  asLead = await signIn(server, lead);
  visitors.set('lead', asLead);
  for (const role of groupRoles) {
    if (role === 'lead') continue;
    const person = await buildPerson(server);
    await buildMember(server, group, person, role);
    visitors.set(role, await signIn(server, person));
  }
  visitors.set('stranger', await signIn(server, await buildPerson(server)));
  const limited = await buildPerson(server);
  await buildMember(server, group, limited, 'author', [crypto.randomUUID()]);
  visitors.set('limited', await signIn(server, limited));
  place = await furnish(group.id);
});
afterAll(() => server.stop());

async function furnish(group: string): Promise<Place> {
  const cells = [cell('yeast', 'network', 'A -> B | 1')];
  const [notebook, binned] = [
    await buildNotebook(server, { id: group }, lead, cells),
    await buildNotebook(server, { id: group }, lead),
  ];
  const made = async (method: 'post' | 'get', path: string, body?: unknown) =>
    (await asLead[method](path, body)).body as { id: string; cells: { digest: string }[] };
  const frozen = await made('post', `/api/notebooks/${notebook}/freeze`, { reasons: {} });
  const invitation = { email: 'referee@example.org', name: '', masked: true, until: tomorrow, message: '' };
  return {
    group,
    notebook,
    binned,
    record: frozen.id,
    review: (await made('post', `/api/records/${frozen.id}/reviews`, invitation)).id,
    remark: (await made('post', `/api/notebooks/${notebook}/remarks`, remark())).id,
    digest: (await made('get', `/api/notebooks/${notebook}/fair-copy`)).cells[0]?.digest ?? '',
  };
}

/** Puts back what an allowed request may have changed. */
async function restore(): Promise<void> {
  await server.sql('update notebook set deleted_at = null where id = $1', [place.notebook]);
  await server.sql('update notebook set deleted_at = now() where id = $1', [place.binned]);
  await server.sql('update review set withdrawn_at = null where id = $1', [place.review]);
}

/** Paths as the routers write them. */
const names: Place = {
  group: ':group',
  notebook: ':notebook',
  binned: ':notebook',
  remark: ':remark',
  record: ':record',
  review: ':review',
  digest: ':digest',
};

/** Doors that ask no role: their links or the session alone open them. Each has tests of its own. */
const otherwiseOpened = [
  'GET /api/notebooks/:notebook/pictures/:digest',
  'GET /api/public/:token',
  'GET /api/public-records/:token',
  'GET /api/public-records/:token/file',
  'GET /api/review/:token',
  'GET /api/review/:token/file',
  'POST /api/review/:token/reruns',
  'GET /api/review/:token/reruns/:rerun',
  'POST /api/review/:token/remarks',
  'PUT /api/review/:token/verdict',
];

test('no door is forgotten', () => {
  const { services } = server;
  const compute = {
    results: new ResultStore(services.database),
    withPlanner: () => Promise.reject(new Error()),
  };
  const routers = [
    notebooksRoutes(services, async () => []),
    filesRoutes(services),
    remarksRoutes(services),
    computeRoutes(services, compute),
    recordsRoutes(services, compute as unknown as Compute, async () => ({ reviews: [], remarks: [] })),
    reviewsRoutes(services),
  ];
  const there = routers.flatMap(({ stack }) =>
    stack.flatMap(
      ({ route }) => route?.stack.map(({ method }) => `${method.toUpperCase()} ${route.path}`) ?? [],
    ),
  );
  const tested = doors.map(({ method, path }) =>
    `${method} ${path(names)}`.replace('/cells/yeast/', '/cells/:cell/'),
  );
  expect(new Set(there)).toEqual(new Set([...tested, ...otherwiseOpened]));
});

for (const { method, path, ability, body } of doors) {
  describe(`${method} ${path(names)}`, () => {
    const send = (visitor: Visitor | undefined) => visitor?.send(method, path(place), body?.());

    for (const role of groupRoles) {
      test(`${role}: ${may(role, ability) ? 'may' : 'may not'}`, async () => {
        await restore();
        const answer = await send(visitors.get(role));
        if (may(role, ability)) expect([200, 201, 202, 204, 400]).toContain(answer?.status);
        else expect(answer?.status).toBe(403);
      });
    }

    test('people of other groups and members limited to other notebooks are told that it is not there', async () => {
      await restore();
      expect((await send(visitors.get('stranger')))?.status).toBe(404);
      if (!path(place).includes('/groups/')) expect((await send(visitors.get('limited')))?.status).toBe(404);
    });

    test('nobody signed in: is asked to sign in', async () => {
      expect((await send(new Visitor(server.url)))?.status).toBe(401);
    });
  });
}
