import type { QueryRunner } from 'typeorm';
import { sealedTables } from './sealed.ts';

/** A name as SQL wants it. */
const quoted = (name: string): string => `"${name.replaceAll('"', '""')}"`;

/**
 * Gives the application role its rights, anew after every migration: all of ordinary tables, only SELECT and INSERT
 * on sealed ones, nothing on the list of migrations.
 */
export async function grantToApplication(runner: QueryRunner, role: string): Promise<void> {
  const name = quoted(role);
  await runner.query(`grant usage on schema public to ${name}`);
  await runner.query(`grant select, insert, update, delete on all tables in schema public to ${name}`);
  await runner.query(`grant usage on all sequences in schema public to ${name}`);
  await runner.query(`revoke all on migration from ${name}`);
  for (const table of await sealedTables(runner)) {
    await runner.query(`revoke update, delete, truncate on ${quoted(table)} from ${name}`);
  }
}

/**
 * Lets the application role make the schema of the job queue, which it then owns (its tables hide their rows from
 * anybody else); the right to make schemas is taken away again.
 */
export async function whileMayCreateSchema(
  runner: QueryRunner,
  role: string,
  work: () => Promise<void>,
): Promise<void> {
  const [{ database }] = (await runner.query('select current_database() as database')) as [
    { database: string },
  ];
  await runner.query(`grant create on database ${quoted(database)} to ${quoted(role)}`);
  try {
    await work();
  } finally {
    await runner.query(`revoke create on database ${quoted(database)} from ${quoted(role)}`);
  }
}
