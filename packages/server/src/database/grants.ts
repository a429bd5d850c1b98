import type { QueryRunner } from 'typeorm';
import { sealedTables } from './sealed.ts';

/** A name as SQL wants it. */
const quoted = (name: string): string => `"${name.replaceAll('"', '""')}"`;

/**
 * Gives the application role its rights, anew after every migration: all of ordinary tables, only SELECT and INSERT
 * on sealed ones, nothing on the list of migrations. The job queue has a schema of its own that the role owns.
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
  await runner.query(`create schema if not exists graphile_worker authorization ${name}`);
}
