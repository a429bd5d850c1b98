import type { Me } from '@stillroom/shared/contracts';
import { addCell, cellText, deleteCell, holdCell, origins } from '@stillroom/shared/document';
import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest';
import { writeDocument } from '../../packages/server/src/modules/notebooks/document.ts';
import { buildGroup, buildMember, buildPerson, signIn } from '../support/build.ts';
import { buildNotebook, cell, closeLive, openLive } from '../support/live.ts';
import type { LiveClient } from '../support/live-client.ts';
import { startTestServer, type TestServer } from '../support/server.ts';

let server: TestServer;
let ada: Me;
let ben: Me;
let reader: Me;
let group: { readonly id: string };

beforeAll(async () => {
  server = await startTestServer();
  [ada, ben, reader] = [await buildPerson(server), await buildPerson(server), await buildPerson(server)];
  group = await buildGroup(server, ada);
  await buildMember(server, group, ben, 'author');
  await buildMember(server, group, reader, 'reader');
});
afterEach(closeLive);
afterAll(() => server.stop());

const reversible = 'A <=> B | 2 /s, 1 /s\nstart A = 3 M';
const rewrite = (client: LiveClient, id: string, text: string) =>
  client.doc.transact(() => {
    const held = cellText(client.doc, id);
    held?.delete(0, held.length);
    held?.insert(0, text);
  }, origins.author);
const species = (notice: { readonly result?: unknown }) =>
  (notice.result as { species?: readonly string[] } | undefined)?.species?.join();

const chain = () => [
  cell('intro', 'prose', 'At the end there are =[run.species.B, last, 3 digits] of B.'),
  cell('yeast', 'network', reversible),
  cell('run', 'trajectory', '', { settings: { network: 'yeast', until: 20 } }),
  cell('ends', 'claim', 'last(run.species.B) > 1.9'),
];

describe('cells compute by themselves', () => {
  test('everything of a new notebook, each after what it draws on, and both authors get the results', async () => {
    const notebook = await buildNotebook(server, group, ada, chain());
    const [a, b] = [await openLive(server, ada, notebook), await openLive(server, ben, notebook)];
    for (const client of [a, b]) {
      await client.cell('yeast', ({ state }) => state === 'current', 'the network');
      await client.cell('run', ({ state }) => state === 'current', 'the trajectory');
      const claim = await client.cell('ends', ({ state }) => state === 'current', 'the claim');
      expect(claim.result).toMatchObject({ verdict: 'holds' });
      const prose = await client.cell('intro', ({ result }) => result !== undefined, 'the prose');
      expect(JSON.stringify(prose.result)).toContain('2.00');
    }
  });

  test('an edit of one author brings the other the new result', async () => {
    const notebook = await buildNotebook(server, group, ada, chain());
    const [a, b] = [await openLive(server, ada, notebook), await openLive(server, ben, notebook)];
    await b.cell('yeast', (notice) => species(notice) === 'A,B', 'the first result');
    rewrite(a, 'yeast', 'A <=> C | 2 /s, 1 /s\nstart A = 3 M');
    await b.cell('yeast', (notice) => species(notice) === 'A,C', 'the second result');
    const run = await b.cell('run', ({ state }) => state === 'current', 'the new trajectory');
    expect(JSON.stringify(run.result)).toContain('"C"');
    const claim = await b.cell(
      'ends',
      ({ state }) => state === 'failed',
      'the claim on a species that is gone',
    );
    expect(claim.error?.message).toMatch(/B/u);
    expect(claim.shown).not.toBeNull();
  });

  test('a comment, a blank and a renaming rerun nothing', async () => {
    const notebook = await buildNotebook(server, group, ada, chain());
    const a = await openLive(server, ada, notebook);
    const before = await a.cell('yeast', ({ state }) => state === 'current', 'the first result');
    const runs = async () =>
      (await server.sql<{ n: number }>('select sum(runs)::int as n from compute_use'))[0]?.n;
    await a.cell('ends', ({ state }) => state === 'current', 'the claim');
    const count = await runs();
    rewrite(a, 'yeast', `# why not\n${reversible}   `);
    await a.allKept();
    const after = await a.cell('yeast', ({ state }) => state === 'current', 'the same result');
    expect(after.digest).toBe(before.digest);
    expect(await runs()).toBe(count);
  });

  test('what is wrong is said on the cell, with its place, and other cells go on', async () => {
    const notebook = await buildNotebook(server, group, ada, [
      cell('good', 'network', reversible),
      cell('bad', 'network', 'A -> B\nA --> C'),
      cell('lost', 'structure', '', { settings: { network: 'nowhere' } }),
      cell('round', 'claim', 'round.left == 1'),
    ]);
    const a = await openLive(server, ada, notebook);
    await a.cell('good', ({ state }) => state === 'current', 'the good one');
    const bad = await a.cell('bad', ({ state }) => state === 'failed', 'the bad one');
    expect(bad.error).toMatchObject({ line: 2 });
    const lost = await a.cell('lost', ({ state }) => state === 'failed', 'the lost one');
    expect(lost.error?.message).toContain('nowhere');
    expect(lost.digest).toBeNull();
    const round = await a.cell('round', ({ state }) => state === 'failed', 'the circle');
    expect(round.error?.message).toContain('itself');
  });

  test('cells that are added and taken out are told of', async () => {
    const notebook = await buildNotebook(server, group, ada, chain());
    const [a, b] = [await openLive(server, ada, notebook), await openLive(server, ben, notebook)];
    await b.cell('yeast', ({ state }) => state === 'current', 'the network');
    addCell(a.doc, cell('more', 'network', 'X -> Y | 1'), 'yeast', origins.author);
    await b.cell('more', ({ state }) => state === 'current', 'the added cell');
    deleteCell(a.doc, 'more', origins.author);
    await b.until(() => !b.plan.has('more'), 'the cell taken out is still there');
  });
});

describe('holding, stopping and bringing up to date', () => {
  test('a held cell keeps its result while what it draws on changes, and runs when asked', async () => {
    const notebook = await buildNotebook(server, group, ada, chain());
    const a = await openLive(server, ada, notebook);
    const visitor = await signIn(server, ada);
    const first = await a.cell('run', ({ state }) => state === 'current', 'the first run');
    holdCell(a.doc, 'run', { by: ada.id, at: new Date().toISOString() }, origins.author);
    rewrite(a, 'yeast', 'A <=> B | 5 /s, 1 /s\nstart A = 3 M');
    const held = await a.cell(
      'run',
      ({ state, digest }) => state === 'held' && digest !== first.digest,
      'held',
    );
    expect(held.shown).toBe(first.digest);
    const claim = await a.cell('ends', ({ state }) => state === 'stale', 'the claim on it');
    expect(claim.words).toContain('run');
    expect((await visitor.post(`/api/notebooks/${notebook}/cells/run/run`)).status).toBe(202);
    await a.cell('run', ({ shown, digest }) => shown === digest, 'run on demand');
    await a.cell('ends', ({ state }) => state === 'current', 'the claim after it');
  });

  test('short cells of the long kinds do not wait behind runaway scripts of the same group', async () => {
    const wild = (n: number) => cell(`wild${n}`, 'script', `let n = ${n}; while (true) n++; return n`);
    const notebook = await buildNotebook(server, group, ada, [wild(1), wild(2)]);
    const a = await openLive(server, ada, notebook);
    for (const id of ['wild1', 'wild2'])
      await a.cell(id, ({ state, since }) => state === 'working' && since !== undefined, 'under way');
    const other = await buildNotebook(server, group, ada, [
      ...chain(),
      cell('sum', 'script', 'return 20 + 22'),
    ]);
    const b = await openLive(server, ben, other);
    for (const id of ['run', 'ends', 'sum'])
      await b.cell(id, ({ state }) => state === 'current', 'computed meanwhile');
    expect(['wild1', 'wild2'].map((id) => a.plan.get(id)?.state)).toEqual(['working', 'working']);
    const visitor = await signIn(server, ada);
    for (const id of ['wild1', 'wild2']) {
      await visitor.post(`/api/notebooks/${notebook}/cells/${id}/stop`);
      await a.cell(id, ({ state }) => state === 'failed', 'stopped');
    }
  });

  test('a runaway script is stopped by a person, only it fails, and says so', async () => {
    const notebook = await buildNotebook(server, group, ada, [
      cell('wild', 'script', 'let n = 0; while (true) n++; return n'),
      cell('calm', 'network', reversible),
    ]);
    const [a, b] = [await openLive(server, ada, notebook), await openLive(server, ben, notebook)];
    await b.cell('wild', ({ state, since }) => state === 'working' && since !== undefined, 'working');
    await b.cell('calm', ({ state }) => state === 'current', 'the other cell meanwhile');
    const visitor = await signIn(server, ada);
    expect((await visitor.post(`/api/notebooks/${notebook}/cells/wild/stop`)).status).toBe(202);
    const stopped = await b.cell('wild', ({ state }) => state === 'failed', 'stopped');
    expect(stopped.error?.message).toMatch(/stopped/iu);
    a.close();
    const again = await openLive(server, ada, notebook);
    await again.cell('wild', ({ state }) => state === 'failed', 'still stopped after coming back');
  });

  test('a script that fails keeps what it printed, for whoever comes later too', async () => {
    const notebook = await buildNotebook(server, group, ada, [
      cell('tells', 'script', 'print("so far")\nthrow new Error("on purpose")'),
    ]);
    const a = await openLive(server, ada, notebook);
    const failed = await a.cell('tells', ({ state }) => state === 'failed', 'failed');
    expect(failed).toMatchObject({ error: { line: 2 }, result: { printed: ['so far'] }, shown: null });
    a.close();
    const again = await openLive(server, ada, notebook);
    const later = await again.cell('tells', ({ state }) => state === 'failed', 'failed still');
    expect(later.result).toEqual({ printed: ['so far'], value: null });
  });

  test('a course that is stopped leaves what there is of it, and is run again when asked', async () => {
    const prey = 'X -> 2 X | 1\nX + Y -> 2 Y | 1\nY -> 0 | 1\nstart X = 2, Y = 1';
    const notebook = await buildNotebook(server, group, ada, [
      cell('prey', 'network', prey),
      cell('endless', 'trajectory', '', {
        settings: { network: 'prey', until: 1e7, points: 2000, rtol: 1e-10, atol: 1e-13 },
      }),
    ]);
    const a = await openLive(server, ada, notebook);
    const visitor = await signIn(server, ada);
    await a.cell('endless', ({ since }) => since !== undefined, 'under way');
    await a.cell('endless', ({ progress }) => (progress ?? 0) > 0, 'further');
    await visitor.post(`/api/notebooks/${notebook}/cells/endless/stop`);
    const stopped = await a.cell('endless', ({ state }) => state === 'failed', 'stopped');
    expect(stopped.result).toMatchObject({ ended: 'stopped' });
    await visitor.post(`/api/notebooks/${notebook}/cells/endless/run`);
    await a.cell('endless', ({ state }) => state === 'working', 'under way again');
    await visitor.post(`/api/notebooks/${notebook}/cells/endless/stop`);
    await a.cell('endless', ({ state }) => state === 'failed', 'stopped again');
  });

  test('a claim on a run that was stopped is undecided, and judged once that is run to its end', async () => {
    const slow = 'let n = 0; for (let i = 0; i < 4000000; i++) n += i; return 1';
    const notebook = await buildNotebook(server, group, ada, [
      cell('slow', 'script', slow),
      cell('one', 'claim', 'slow.value == 1'),
    ]);
    const a = await openLive(server, ada, notebook);
    const visitor = await signIn(server, ada);
    const verdict = ({ result }: { readonly result?: unknown }) =>
      (result as { verdict?: string } | undefined)?.verdict;
    await a.cell('slow', ({ state }) => state === 'working', 'under way');
    await visitor.post(`/api/notebooks/${notebook}/cells/slow/stop`);
    await a.cell('slow', ({ state }) => state === 'failed', 'stopped');
    await a.cell('one', (notice) => verdict(notice) === 'undecided', 'undecided');
    await visitor.post(`/api/notebooks/${notebook}/cells/slow/run`);
    await a.cell('slow', ({ state }) => state === 'current', 'run to its end');
    await a.cell('one', (notice) => verdict(notice) === 'holds', 'judged');
    const left = await server.sql('select digest from cell_attempt where digest = $1', [
      a.plan.get('one')?.digest,
    ]);
    expect(left).toEqual([]);
  });

  test('a run that nobody needs any more is ended, so that the newest has its turn', async () => {
    const notebook = await buildNotebook(server, group, ada, [cell('s', 'script', 'while (true);')]);
    const a = await openLive(server, ada, notebook);
    await a.cell('s', ({ since }) => since !== undefined, 'the endless run');
    rewrite(a, 's', 'return 41 + 1');
    const current = await a.cell('s', ({ state }) => state === 'current', 'the new run');
    expect(current.result).toMatchObject({ value: 42 });
    await expect.poll(async () => (await server.sql('select 1 from cell_run')).length).toBe(0);
  });
});

describe('who may run', () => {
  test('a reader alone sees what is kept and starts nothing; an author who comes in does', async () => {
    const notebook = await buildNotebook(server, group, ada);
    // As if the process had ended before anything was computed.
    const content = {
      title: 'Asleep',
      subject: 'none',
      cells: [cell('n', 'network', 'P -> Q | 7')],
    } as const;
    await server.sql('delete from notebook_snapshot where notebook = $1', [notebook]);
    await writeDocument(server.services.database, notebook, content);
    const r = await openLive(server, reader, notebook);
    await r.cell('n', ({ state }) => state === 'stale', 'not computed');
    const visitor = await signIn(server, reader);
    for (const path of ['run', 'cells/n/run', 'cells/n/stop'])
      expect((await visitor.post(`/api/notebooks/${notebook}/${path}`)).status).toBe(403);
    expect(await server.sql('select 1 from cell_run where notebook = $1', [notebook])).toEqual([]);
    expect(r.plan.get('n')?.state).toBe('stale');
    await openLive(server, ada, notebook);
    await r.cell('n', ({ state }) => state === 'current', 'computed for the author');
  });
});
