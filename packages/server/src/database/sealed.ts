import type { QueryRunner } from 'typeorm';

const functionName = 'refuse_change';

/** Makes the function that every sealed table's triggers call. */
export async function createSeal(runner: QueryRunner): Promise<void> {
  await runner.query(`
    create function ${functionName}() returns trigger language plpgsql as $$
    begin
      raise exception 'Lines of "%" are added, never altered.', tg_table_name
        using errcode = 'restrict_violation';
    end $$`);
}

/**
 * Seals a table: from now on lines are only added. The triggers refuse everybody, the owner too, and also a statement
 * that would meet no line; `grantToApplication` finds them and takes the rights away besides.
 */
export async function seal(runner: QueryRunner, table: string): Promise<void> {
  await runner.query(`
    create trigger sealed before update or delete or truncate on "${table}"
    for each statement execute function ${functionName}()`);
}

/** Names of all sealed tables. */
export async function sealedTables(runner: QueryRunner): Promise<string[]> {
  const rows: { name: string }[] = await runner.query(`
    select c.relname as name from pg_trigger t join pg_class c on c.oid = t.tgrelid
    where t.tgname = 'sealed' and not t.tgisinternal order by 1`);
  return rows.map(({ name }) => name);
}
