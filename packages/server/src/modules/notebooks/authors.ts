import type { Queries } from './document.ts';

/** Names of everybody who has written in a notebook, in order of name. Reads the log too: not all of it is compacted. */
export async function readAuthors(queries: Queries, notebook: string): Promise<string[]> {
  const rows = (await queries.query(
    `select name from person where id in (
       select person from notebook_author where notebook = $1
       union select person from notebook_update where notebook = $1
       union select created_by from notebook where id = $1
     ) order by name`,
    [notebook],
  )) as { name: string }[];
  return rows.map(({ name }) => name);
}
