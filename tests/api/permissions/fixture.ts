import type { Me } from '@stillroom/shared/contracts';
import { type GroupRole, groupRoles } from '@stillroom/shared/roles';
import { digestOf } from '../../../packages/server/src/modules/auth/index.ts';
import { createNotebook, writeRemark } from '../../../packages/server/src/modules/notebooks/index.ts';
import { sealContent } from '../../../packages/server/src/modules/records/content.ts';
import { buildGroup, buildMember, buildPerson, signIn } from '../../support/build.ts';
import type { TestServer } from '../../support/server.ts';
import { Visitor } from '../../support/visitor.ts';

/** Everybody who may stand before a door of a group: its roles, an outsider with an account, and nobody signed in. */
export const callers = [...groupRoles, 'outsider', 'nobody'] as const;
export type Caller = (typeof callers)[number];

export interface Crowd {
  readonly people: Readonly<Record<GroupRole | 'outsider' | 'founder' | 'target', Me>>;
  readonly visitors: Readonly<Record<Caller, Visitor>>;
}

/** One person for each role, signed in once for all cases; the group of each case is fresh. */
export async function gatherCrowd(server: TestServer): Promise<Crowd> {
  const [lead, author, remarker, reader, outsider, founder, target] = [
    await buildPerson(server, { name: 'Lead' }),
    await buildPerson(server, { name: 'Author' }),
    await buildPerson(server, { name: 'Remarker' }),
    await buildPerson(server, { name: 'Reader' }),
    await buildPerson(server, { name: 'Outsider' }),
    await buildPerson(server, { name: 'Founder' }),
    await buildPerson(server, { name: 'Target' }),
  ];
  return {
    people: { lead, author, remarker, reader, outsider, founder, target },
    visitors: {
      lead: await signIn(server, lead),
      author: await signIn(server, author),
      remarker: await signIn(server, remarker),
      reader: await signIn(server, reader),
      outsider: await signIn(server, outsider),
      nobody: new Visitor(server.url),
    },
  };
}

/** Ids that requests are made of. */
export interface Fixture {
  readonly group: string;
  readonly notebook: string;
  readonly remark: string;
  readonly record: string;
  readonly review: string;
  /** Secrets of the links to the fair copy, the record and the review. */
  readonly links: Readonly<Record<'copy' | 'record' | 'review', string>>;
  readonly invitation: string;
  readonly target: string;
  readonly self: (caller: Caller) => string;
}

/** The first bytes of a PNG are all that is looked at. */
export const png = Buffer.from('89504e470d0a1a0a0000000d49484452', 'hex');

const nobody = '00000000-0000-4000-8000-000000000000';

/** A fresh group with everybody in it, a notebook with one cell and a remark, and an open invitation. */
export async function buildFixture(
  server: TestServer,
  { people }: Crowd,
  chosen: (notebook: string) => string[] | null = () => null,
): Promise<Fixture> {
  const { manager } = server.services.database;
  const group = await buildGroup(server, people.founder);
  const cell = { id: 'c1', kind: 'prose', name: '', text: 'Words.', settings: {}, held: null } as const;
  const content = { title: 'A notebook', subject: 'none', cells: [cell] } as const;
  const notebook = await createNotebook(manager, { group: group.id, by: people.founder.id, content });
  for (const role of groupRoles) {
    await buildMember(server, group, people[role], role, chosen(notebook.id));
  }
  await buildMember(server, group, people.target, 'reader');
  const words = { cell: 'c1', quote: '', text: 'A remark.' };
  const remark = await writeRemark(manager, notebook.id, words, { by: people.founder.id });
  const record = await buildRecord(server, group.id, notebook.id, people.founder.id);
  const [invitation] = await server.sql<{ id: string }>(
    `insert into invitation (digest, "group", email, role, message, by, until)
     values (gen_random_uuid()::text, $1, 'guest@example.org', 'reader', '', $2, now() + interval '1 day') returning id`,
    [group.id, people.founder.id],
  );
  return {
    group: group.id,
    notebook: notebook.id,
    remark: remark.id,
    ...record,
    invitation: invitation?.id ?? nobody,
    target: people.target.id,
    self: (caller) => (caller === 'nobody' ? nobody : people[caller].id),
  };
}

/** Tells the links of one fixture from those of another. */
let built = 0;
const reviewToken = (number: number): string => `review-token-${number}`;

/** A record with nothing in it, under review; freezing a computed notebook is for other tests. */
async function buildRecord(
  server: TestServer,
  group: string,
  notebook: string,
  by: string,
): Promise<Pick<Fixture, 'record' | 'review' | 'links'>> {
  built += 1;
  const number = built;
  const frozenAt = new Date().toISOString();
  const { text, digest } = sealContent({
    format: 'stillroom-record/1',
    group: { id: group, name: 'Kinetics' },
    number: 1,
    notebook,
    title: 'A notebook',
    subject: 'none',
    authors: ['Founder'],
    frozenAt,
    frozenBy: 'Founder',
    engine: 'none',
    reasons: {},
    cells: [],
  });
  const [record] = await server.sql<{ id: string }>(
    `insert into record ("group", number, notebook, title, frozen_at, frozen_by, digest, content)
     values ($1, 1, $2, 'A notebook', $3, $4, $5, $6) returning id`,
    [group, notebook, frozenAt, by, digest, text],
  );
  const [review] = await server.sql<{ id: string }>(
    `insert into review (record, number, email, name, masked, until, digest, invited_by)
     values ($1, 1, 'referee@example.org', '', true, now() + interval '9 days', $3, $2)
     returning id`,
    [record?.id, by, digestOf(reviewToken(number))],
  );
  const links = { copy: `copy-${number}`, record: `record-${number}`, review: reviewToken(number) };
  await server.sql('update notebook set public_token = $2 where id = $1', [notebook, links.copy]);
  await server.sql('insert into record_link (record, token) values ($1, $2)', [record?.id, links.record]);
  return { record: record?.id ?? nobody, review: review?.id ?? nobody, links };
}
