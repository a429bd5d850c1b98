import type { MigrationInterface, QueryRunner } from 'typeorm';

/**
 * Remarks out of a review belong to the record they were made on, and outlive the notebook as the record does: nobody
 * takes them away or puts other words into them, not even the owner. Settling them stays possible.
 */
export class RemarksOfReviews1796083206000 implements MigrationInterface {
  readonly name = 'RemarksOfReviews1796083206000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query('alter table remark drop constraint remark_notebook_fkey');
    await runner.query('create index remark_record on remark (record) where record is not null');
    await runner.query(`
      create function refuse_remark_change() returns trigger language plpgsql as $$
      begin
        if tg_op = 'UPDATE' then
          if (to_jsonb(new) - 'settled_at' - 'settled_by') = (to_jsonb(old) - 'settled_at' - 'settled_by') then
            return new;
          end if;
        end if;
        raise exception 'Remarks of a review are added, never altered.' using errcode = 'restrict_violation';
      end $$`);
    await runner.query(`
      create trigger of_review before update or delete on remark
      for each row when (old.review is not null) execute function refuse_remark_change()`);
    await runner.query(`
      create trigger of_reviews before truncate on remark
      for each statement execute function refuse_remark_change()`);
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('drop trigger of_review on remark');
    await runner.query('drop trigger of_reviews on remark');
    await runner.query('drop function refuse_remark_change()');
    await runner.query('drop index remark_record');
    await runner.query('delete from remark where notebook not in (select id from notebook)');
    await runner.query(`
      alter table remark add constraint remark_notebook_fkey
        foreign key (notebook) references notebook on delete cascade`);
  }
}
