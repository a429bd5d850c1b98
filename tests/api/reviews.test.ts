import type {
  Me,
  RecordView,
  RemarkView,
  RerunView,
  ReviewSummary,
  ReviewView,
} from '@stillroom/shared/contracts';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { emptyBin } from '../../packages/server/src/modules/notebooks/commands/bin.ts';
import { buildGroup, buildMember, buildPerson, signIn } from '../support/build.ts';
import { buildNotebook, cell } from '../support/live.ts';
import { startTestServer, type TestServer } from '../support/server.ts';
import { Visitor } from '../support/visitor.ts';

let server: TestServer;
let lead: Me;
let group: { readonly id: string };
let notebook: string;
let record: string;
let asLead: Visitor;
let asAuthor: Visitor;
let asReader: Visitor;

beforeAll(async () => {
  server = await startTestServer();
  lead = await buildPerson(server, { name: 'Ada Quillane' });
  const [author, reader] = [await buildPerson(server), await buildPerson(server)];
  group = await buildGroup(server, lead, 'Brewhouse');
  await buildMember(server, group, author, 'author');
  await buildMember(server, group, reader, 'reader');
  [asLead, asAuthor, asReader] = [
    await signIn(server, lead),
    await signIn(server, author),
    await signIn(server, reader),
  ];
  notebook = await buildNotebook(server, group, lead, [
    cell('intro', 'prose', 'At the end: =[run.species.B, last, 3 digits].'),
    cell('yeast', 'network', 'A <=> B | 2 /s, 1 /s\nstart A = 3 M'),
    cell('run', 'trajectory', '', { settings: { network: 'yeast', until: 20 } }),
    cell('ends', 'claim', 'last(run.species.B) > 1.9'),
  ]);
  const frozen = await asAuthor.post(`/api/notebooks/${notebook}/freeze`, { reasons: {} });
  record = (frozen.body as { id: string }).id;
});
afterAll(() => server.stop());

const anyone = () => new Visitor(server.url);
const inDays = (days: number) => new Date(Date.now() + days * 86_400_000).toISOString().slice(0, 10);
let invited = 0;

/** Invites somebody and takes the link out of the letter. */
async function invite(rest: Partial<{ masked: boolean; until: string; name: string }> = {}) {
  invited += 1;
  const email = `referee${invited}@example.org`;
  const invitation = {
    email,
    name: `Referee ${invited}`,
    masked: false,
    until: inDays(20),
    message: 'Please.',
    ...rest,
  };
  const { status, body } = await asLead.post(`/api/records/${record}/reviews`, invitation);
  const [letter] = await server.sql<{ text: string; masked: boolean }>(
    'select text, masked from mail where recipient = $1',
    [email],
  );
  const token = /\/review\/(\S+)/u.exec(letter?.text ?? '')?.[1] ?? '';
  return { status, summary: body as ReviewSummary, token, letter, email };
}

/** Asks for a rerun and waits until it is done. */
async function rerun(token: string, body: object = {}): Promise<RerunView> {
  const begun = await anyone().post(`/api/review/${token}/reruns`, body);
  expect(begun.status).toBe(201);
  const { id } = begun.body as RerunView;
  let view = begun.body as RerunView;
  await expect
    .poll(
      async () => {
        view = (await anyone().get(`/api/review/${token}/reruns/${id}`)).body as RerunView;
        return view.done;
      },
      { timeout: 20_000 },
    )
    .toBe(true);
  return view;
}
const outcomes = (view: RerunView) =>
  Object.fromEntries(Object.entries(view.cells).map(([id, { outcome }]) => [id, outcome]));

describe('an invitation', () => {
  test('sends a letter with a link that opens the record without a password', async () => {
    const { status, token, summary } = await invite();
    expect(status).toBe(201);
    expect(summary).toMatchObject({ state: 'invited', masked: false, verdict: null });
    const view = (await anyone().get(`/api/review/${token}`)).body as ReviewView;
    expect(view.record).toMatchObject({ id: record, title: 'Diacetyl rest' });
    expect(view.record.cells).toHaveLength(4);
    expect(view.by).toMatchObject({ name: 'Ada Quillane' });
    expect(view.record.abilities).toContain('review.rerun');
    expect(view.record.abilities).not.toContain('notebook.read');
    const file = await anyone().get(`/api/review/${token}/file`);
    expect(file.body).toMatchObject({ digest: view.record.digest });
    const { reviews } = (await asAuthor.get(`/api/records/${record}`)).body as RecordView;
    expect(reviews.find(({ id }) => id === summary.id)).toMatchObject({ state: 'opened' });
  });

  test('keeps only a digest of the link', async () => {
    const { token } = await invite();
    const rows = await server.sql<{ digest: string }>('select digest from review');
    expect(rows.map(({ digest }) => digest)).not.toContain(token);
    expect(JSON.stringify(await server.sql('select * from review'))).not.toContain(token);
  });

  test('of a masked reviewer hides name, address and letter from everybody but the lead', async () => {
    const { summary, letter, email } = await invite({ masked: true, name: 'Dr Secret' });
    expect(summary.email).toBe(email);
    expect(letter?.masked).toBe(true);
    const seen = (await asAuthor.get(`/api/records/${record}`)).body as RecordView;
    const review = seen.reviews.find(({ id }) => id === summary.id);
    expect(review).toMatchObject({ masked: true, email: null });
    expect(review?.name).toMatch(/^Reviewer \d+$/u);
    expect(JSON.stringify(seen)).not.toContain('Secret');
  });

  test('is given by leads alone, and readers do not see reviews', async () => {
    const invitation = { email: 'x@example.org', name: '', masked: false, until: inDays(3), message: '' };
    expect((await asAuthor.post(`/api/records/${record}/reviews`, invitation)).status).toBe(403);
    expect(((await asReader.get(`/api/records/${record}`)).body as RecordView).reviews).toEqual([]);
  });

  test('needs a last day from today on', async () => {
    expect((await invite({ until: inDays(-1) })).status).toBe(400);
    expect((await invite({ until: inDays(800) })).status).toBe(400);
    expect((await invite({ until: inDays(0) })).status).toBe(201);
  });
});

describe('a link that does not open any more says why', () => {
  const words = async (token: string) => {
    const { status, body } = await anyone().get(`/api/review/${token}`);
    expect(status).toBe(410);
    expect(body).toMatchObject({ error: 'gone' });
    return (body as { message: string }).message;
  };

  test('withdrawn', async () => {
    const { token, summary } = await invite();
    expect((await asLead.delete(`/api/records/${record}/reviews/${summary.id}`)).status).toBe(204);
    expect(await words(token)).toContain('withdrawn');
    expect((await anyone().post(`/api/review/${token}/reruns`, {})).status).toBe(410);
  });

  test('run out', async () => {
    const { token, summary } = await invite();
    await server.sql(`update review set until = current_date - 2 where id = $1`, [summary.id]);
    expect(await words(token)).toContain('worked until');
  });

  test('never was one', async () => {
    expect(await words('nothing-of-this-kind')).toContain('does not open a review');
  });

  test('used: after the verdict it still reads, and takes nothing more', async () => {
    const { token, summary } = await invite();
    const verdict = {
      recommendation: 'take when met',
      toAuthors: 'Nearly there.',
      toEditor: 'Between us: fine.',
      claims: { ends: 'supported' },
    };
    expect((await anyone().put(`/api/review/${token}/verdict`, verdict)).status).toBe(204);
    const view = (await anyone().get(`/api/review/${token}`)).body as ReviewView;
    expect(view.verdict).toEqual(verdict);
    for (const [method, path, body] of [
      ['PUT', 'verdict', verdict],
      ['POST', 'reruns', {}],
      ['POST', 'remarks', { cell: 'run', quote: '', text: 'One more thing.' }],
    ] as const) {
      const refused = await anyone().send(method, `/api/review/${token}/${path}`, body);
      expect(refused.status).toBe(410);
      expect((refused.body as { message: string }).message).toContain('sent your verdict');
    }
    const { reviews } = (await asAuthor.get(`/api/records/${record}`)).body as RecordView;
    const seen = reviews.find(({ id }) => id === summary.id);
    expect(seen).toMatchObject({
      state: 'returned',
      verdict: { recommendation: 'take when met', toAuthors: 'Nearly there.' },
    });
    expect(JSON.stringify(seen)).not.toContain('Between us');
    expect((await asLead.delete(`/api/records/${record}/reviews/${summary.id}`)).status).toBe(409);
  });
});

describe('a rerun', () => {
  test('computes every cell anew and finds each as it is in the record, without touching it', async () => {
    const { token } = await invite();
    const before = await server.sql('select md5(content) as sum from record order by id');
    const kept = await server.sql('select digest, at from cell_result order by digest');
    const view = await rerun(token);
    expect(outcomes(view)).toEqual({ intro: 'matches', yeast: 'matches', run: 'matches', ends: 'matches' });
    expect(await server.sql('select md5(content) as sum from record order by id')).toEqual(before);
    expect(await server.sql('select digest, at from cell_result order by digest')).toEqual(kept);
  });

  test('of one cell compares that cell alone', async () => {
    const { token } = await invite();
    expect(outcomes(await rerun(token, { cell: 'ends' }))).toEqual({ ends: 'matches' });
    const missing = await anyone().post(`/api/review/${token}/reruns`, { cell: 'nowhere' });
    expect(missing.status).toBe(404);
  });

  test('never reads a kept result: forged ones change nothing', async () => {
    const { token } = await invite();
    await server.sql(`update cell_result set result = '{"forged":true}', result_digest = 'sha256:0'`);
    expect(outcomes(await rerun(token))).toEqual({
      intro: 'matches',
      yeast: 'matches',
      run: 'matches',
      ends: 'matches',
    });
  });

  test('says which cells differ, shows what came out, and which failed and why', async () => {
    const forged = await forgeRecord();
    const { token } = await inviteTo(forged);
    const view = await rerun(token);
    expect(outcomes(view)).toMatchObject({ yeast: 'differs', broken: 'failed' });
    expect(view.cells['yeast']?.result).toMatchObject({ species: ['A', 'B'] });
    expect(view.cells['broken']?.why).toMatch(/\S/u);
  });

  test('does not wait for that of another reviewer, whose record holds a runaway', async () => {
    const endless = await forgeRecord(1001, [
      { id: 'wild', kind: 'script', name: 'wild', text: 'while (true);' },
    ]);
    const { token: slow } = await inviteTo(endless);
    const begun = (await anyone().post(`/api/review/${slow}/reruns`, {})).body as RerunView;
    const look = async () => (await anyone().get(`/api/review/${slow}/reruns/${begun.id}`)).body as RerunView;
    await expect.poll(async () => (await look()).cells['wild']?.outcome, { timeout: 20_000 }).toBe('working');
    const { token } = await invite();
    expect(outcomes(await rerun(token))).toMatchObject({ run: 'matches', ends: 'matches' });
    expect((await look()).done).toBe(false);
  });

  /** A record that was tampered with before it was sealed, as another machine or engine might have made it. */
  async function forgeRecord(
    number = 1000,
    written = [
      { id: 'yeast', kind: 'network', name: 'yeast', text: 'A <=> B | 2 /s, 1 /s' },
      { id: 'broken', kind: 'network', name: 'broken', text: 'A --> B' },
    ],
  ): Promise<string> {
    const cells = written.map((frozen) => ({
      ...frozen,
      settings: {},
      draws: [],
      state: 'current',
      digest: 'sha256:1',
      resultDigest: 'sha256:2',
      result: {},
      error: null,
      warnings: [],
    }));
    const content = { group: { id: group.id, name: 'Brewhouse' }, title: 'Forged', cells, reasons: {} };
    const [made] = await server.sql<{ id: string }>(
      `insert into record ("group", number, notebook, title, frozen_at, frozen_by, digest, content)
       values ($1, $5, $2, 'Forged', now(), $3, 'sha256:3', $4) returning id`,
      [group.id, notebook, lead.id, JSON.stringify(content), number],
    );
    return made?.id ?? '';
  }
  const inviteTo = async (other: string) => {
    const ours = record;
    record = other;
    const made = await invite();
    record = ours;
    return made;
  };
});

describe('a reviewer’s remark', () => {
  test('is seen and answered by the authors in the notebook, under the name the reviewer goes by', async () => {
    const { token } = await invite({ masked: true, name: 'Dr Secret' });
    const words = { cell: 'run', quote: '', text: 'Why stop at 20?' };
    const sent = await anyone().post(`/api/review/${token}/remarks`, words);
    expect(sent.status).toBe(201);
    const seen = (await asAuthor.get(`/api/notebooks/${notebook}/remarks`)).body as RemarkView[];
    const remark = seen.find(({ id }) => id === (sent.body as RemarkView).id);
    expect(remark).toMatchObject({ ...words, fromReview: { record, number: 1 }, by: { id: null } });
    expect(JSON.stringify(seen)).not.toContain('Secret');
    await asAuthor.post(`/api/notebooks/${notebook}/remarks/${remark?.id}/answers`, {
      text: 'It is flat by then.',
    });
    const { remarks } = (await anyone().get(`/api/review/${token}`)).body as ReviewView;
    expect(remarks).toMatchObject([{ ...words, answers: [{ text: 'It is flat by then.' }] }]);
  });

  test('another reviewer does not see it', async () => {
    const [one, two] = [await invite(), await invite()];
    await anyone().post(`/api/review/${one.token}/remarks`, { cell: 'run', quote: '', text: 'Mine alone.' });
    const view = (await anyone().get(`/api/review/${two.token}`)).body as ReviewView;
    expect(view.remarks).toEqual([]);
    expect(view.record.remarks).toEqual([]);
  });
});

describe('a record whose notebook is gone for good', () => {
  test('keeps the remarks of its reviewers, and can still be read, remarked on and judged', async () => {
    const { token } = await invite();
    const words = { cell: 'run', quote: '', text: 'Before it went.' };
    expect((await anyone().post(`/api/review/${token}/remarks`, words)).status).toBe(201);
    await asAuthor.post(`/api/notebooks/${notebook}/remarks`, { ...words, text: 'Among ourselves.' });
    await server.sql(`update notebook set deleted_at = now() - interval '31 days' where id = $1`, [notebook]);
    await emptyBin(server.services.database.manager);
    expect(await server.sql('select id from notebook where id = $1', [notebook])).toEqual([]);
    const later = { ...words, text: 'After it went.' };
    expect((await anyone().post(`/api/review/${token}/remarks`, later)).status).toBe(201);
    const { remarks } = (await anyone().get(`/api/review/${token}`)).body as ReviewView;
    expect(remarks.map(({ text }) => text)).toEqual(['Before it went.', 'After it went.']);
    const seen = (await asAuthor.get(`/api/records/${record}`)).body as RecordView;
    expect(seen.remarks.map(({ text }) => text)).toEqual(
      expect.arrayContaining(['Before it went.', 'After it went.']),
    );
    const members = await server.sql('select id from remark where notebook = $1 and review is null', [
      notebook,
    ]);
    expect(members).toEqual([]);
  });

  test('what a reviewer wrote cannot be altered or taken away, not even by the owner of the database', async () => {
    for (const statement of [
      'delete from remark where review is not null',
      `update remark set text = 'All is well.' where review is not null`,
      'update remark set notebook = gen_random_uuid() where review is not null',
      'truncate remark cascade',
    ])
      await expect(server.sql(statement), statement).rejects.toThrow('never altered');
  });
});
