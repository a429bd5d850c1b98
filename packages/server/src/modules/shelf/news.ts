import type { ShelfView } from '@stillroom/shared/contracts';
import { may } from '@stillroom/shared/roles';
import type { EntityManager } from 'typeorm';
import type { ShelvedNotebook } from './rows.ts';

type News = ShelfView['lately'][number];

interface Line {
  readonly notebook: string;
  readonly at: Date;
}

/** How far back news go, and how many are shown. */
const days = 21;
const most = 12;

const quoted = (title: string): string => `“${title || 'Untitled'}”`;
const since = `now() - interval '${days} days'`;

/** What waits for a person: remarks nobody has settled, and reviews that came back. */
export async function waitingFor(
  manager: EntityManager,
  person: string,
  notebooks: readonly ShelvedNotebook[],
): Promise<News[]> {
  const own = notebooks.filter(({ role }) => may(role, 'notebook.settle'));
  const remarks: (Line & { count: number })[] = await manager.query(
    `select notebook, count(*)::int as count, max(at) as at from remark r
     where notebook = any($1) and settled_at is null and by is distinct from $2
       and not exists (
         select from remark_answer a where a.remark = r.id and a.by = $2
           and a.at = (select max(at) from remark_answer last where last.remark = r.id)
       )
     group by notebook`,
    [own.map(({ id }) => id), person],
  );
  const reviews: (Line & { record: string; number: number; reviewer: string })[] = await manager.query(
    `select c.notebook, v.returned_at as at, c.id as record, c.number,
       case when v.masked then 'Reviewer ' || v.number when v.name = '' then v.email else v.name end as reviewer
     from review v join record c on c.id = v.record
     where c.notebook = any($1) and v.returned_at > ${since}`,
    [notebooks.filter(({ role }) => may(role, 'record.reviews.read')).map(({ id }) => id)],
  );
  const titles = titlesOf(notebooks);
  return newest([
    ...remarks.map(({ notebook, count, at }) => ({
      words: `${count === 1 ? 'A remark is' : `${count} remarks are`} open in ${quoted(titles.get(notebook) ?? '')}`,
      to: `/notebooks/${notebook}`,
      at,
    })),
    ...reviews.map(({ record, number, reviewer, at }) => ({
      words: `${reviewer} returned a review of record No. ${number}`,
      to: `/records/${record}`,
      at,
    })),
  ]);
}

/** What others did lately in the notebooks a person may see. */
export async function lately(
  manager: EntityManager,
  person: string,
  notebooks: readonly ShelvedNotebook[],
): Promise<News[]> {
  const ids = notebooks.map(({ id }) => id);
  const titles = titlesOf(notebooks);
  const work: (Line & { name: string })[] = await manager.query(
    `select w.notebook, p.name, max(w.at) as at from (
       select notebook, person, last_at as at from notebook_author where notebook = any($1)
       union all
       select notebook, person, max(at) from notebook_update where notebook = any($1) group by notebook, person
     ) w join person p on p.id = w.person
     where w.person <> $2 and w.at > ${since}
     group by w.notebook, p.name`,
    [ids, person],
  );
  const frozen: (Line & { record: string; number: number; name: string })[] = await manager.query(
    `select c.notebook, c.id as record, c.number, p.name, c.frozen_at as at
     from record c join person p on p.id = c.frozen_by
     where c.notebook = any($1) and c.frozen_at > ${since}`,
    [ids],
  );
  const answers: (Line & { name: string })[] = await manager.query(
    `select r.notebook, p.name, max(a.at) as at
     from remark_answer a join remark r on r.id = a.remark join person p on p.id = a.by
     where r.notebook = any($1) and r.by = $2 and a.by <> $2 and a.at > ${since}
     group by r.notebook, p.name`,
    [ids, person],
  );
  return newest([
    ...work.map(({ notebook, name, at }) => ({
      words: `${name} wrote in ${quoted(titles.get(notebook) ?? '')}`,
      to: `/notebooks/${notebook}`,
      at,
    })),
    ...frozen.map(({ notebook, record, number, name, at }) => ({
      words: `${name} froze ${quoted(titles.get(notebook) ?? '')} as record No. ${number}`,
      to: `/records/${record}`,
      at,
    })),
    ...answers.map(({ notebook, name, at }) => ({
      words: `${name} answered your remark in ${quoted(titles.get(notebook) ?? '')}`,
      to: `/notebooks/${notebook}`,
      at,
    })),
  ]);
}

const titlesOf = (notebooks: readonly ShelvedNotebook[]): ReadonlyMap<string, string> =>
  new Map(notebooks.map(({ id, title }) => [id, title]));

function newest(news: readonly (Omit<News, 'at'> & { readonly at: Date })[]): News[] {
  return [...news]
    .sort((a, b) => b.at.getTime() - a.at.getTime())
    .slice(0, most)
    .map((line) => ({ ...line, at: line.at.toISOString() }));
}
