import type { FairCopy, GroupView, RecordView, ReviewView, SessionView } from '@stillroom/shared/contracts';
import { afterAll, beforeAll, describe, expect, test, vi } from 'vitest';
import { readDemoNotebook } from '../../../packages/server/src/demo/notebook-files.ts';
import { demoGroups, demoPassword, demoPeople } from '../../../packages/server/src/demo/people.ts';
import { seedDemo } from '../../../packages/server/src/demo/seed.ts';
import { startTestServer, type TestServer } from '../../support/server.ts';
import { Visitor } from '../../support/visitor.ts';

// The engine's worker must have been built: npm test does that first.
let server: TestServer;
beforeAll(async () => {
  server = await startTestServer({ DEMO: '1' });
}, 120_000);
afterAll(() => server.stop());

async function enter(email: string): Promise<Visitor> {
  const visitor = new Visitor(server.url);
  expect((await visitor.post('/api/session', { email, password: demoPassword })).status).toBe(200);
  return visitor;
}

const session = async () => (await new Visitor(server.url).get('/api/session')).body as SessionView;

/** The only notebook of a demo group, seen by its lead. */
async function notebookOf({ name, members }: (typeof demoGroups)[number]): Promise<[Visitor, string]> {
  const lead = demoPeople.find(({ key }) => key === members[0]?.[0]);
  const visitor = await enter(lead?.email ?? '');
  const groups = (await visitor.get('/api/groups')).body as { id: string; name: string }[];
  const group = groups.find((candidate) => candidate.name === name);
  const view = (await visitor.get(`/api/groups/${group?.id}`)).body as GroupView;
  return [visitor, view.notebooks[0]?.id ?? ''];
}

describe('the demo', () => {
  test('lets in an operator, a lead, authors, a remarker and a reader', async () => {
    const { demo } = await session();
    expect(new Set(demo.map(({ role }) => role))).toEqual(
      new Set(['operator', 'lead', 'author', 'remarker', 'reader']),
    );
    for (const { email } of demo) await enter(email);
  });

  test('is seeded once', async () => {
    expect(await seedDemo(server.services)).toBe(false);
    const rows = await server.sql('select id from work_group');
    expect(rows).toHaveLength(demoGroups.length);
  });

  test.each(demoGroups.map((group) => [group.notebook, group] as const))(
    '%s: every cell is computed and every claim holds',
    async (_name, group) => {
      const [visitor, notebook] = await notebookOf(group);
      await vi.waitFor(
        async () => {
          const { cells } = (await visitor.get(`/api/notebooks/${notebook}/fair-copy`)).body as FairCopy;
          const unfinished = cells.filter(({ state, error }) => state !== 'current' || error !== null);
          expect(unfinished.map(({ name, state, error }) => [name, state, error?.message])).toEqual([]);
          const claims = cells.filter(({ kind }) => kind === 'claim');
          const verdicts = claims.map(({ name, result }) => [name, (result as { verdict: string }).verdict]);
          expect(verdicts).toEqual(claims.map(({ name }) => [name, 'holds']));
        },
        { timeout: 60_000, interval: 500 },
      );
    },
    90_000,
  );

  test('has a record under review that its link opens without a password', async () => {
    const { demoReview } = await session();
    expect(demoReview).toMatch(/^\/review\/[\w-]{40,}$/u);
    const { status, body } = await new Visitor(server.url).get(`/api${demoReview}`);
    expect(status).toBe(200);
    const { record } = body as ReviewView;
    expect(record).toMatchObject({ number: 1, title: 'Diacetyl rest: can clearance stall?' });
    expect((record as RecordView).cells.every(({ resultDigest }) => resultDigest !== null)).toBe(true);
  });
});

describe('the demo notebooks', () => {
  test.each(demoGroups.map(({ notebook }) => notebook))('%s says that its numbers are invented', (name) => {
    const { cells } = readDemoNotebook(name);
    const [first] = cells;
    expect(first?.kind).toBe('prose');
    expect(first?.text).toMatch(/invented/u);
  });

  test('those on food and people carry their subject, and so a caution', () => {
    expect(readDemoNotebook('diacetyl-rest').subject).toBe('process safety');
    expect(readDemoNotebook('norovirus-aboard-a-ferry').subject).toBe('public health');
  });
});
