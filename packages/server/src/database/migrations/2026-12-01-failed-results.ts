import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Lets a kept failure hold what the cell left before it failed, such as the lines a script had printed. */
export class FailedResults1796083205000 implements MigrationInterface {
  readonly name = 'FailedResults1796083205000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`
      alter table cell_result
        drop constraint cell_result_check,
        drop constraint cell_result_check1,
        add constraint cell_result_good check (error is not null or (result is not null and result_digest is not null)),
        add constraint cell_result_failed check (error is null or result_digest is null)`);
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('update cell_result set result = null where error is not null');
    await runner.query(`
      alter table cell_result
        drop constraint cell_result_good,
        drop constraint cell_result_failed,
        add constraint cell_result_check check ((result is null) = (result_digest is null)),
        add constraint cell_result_check1 check ((error is null) <> (result is null))`);
  }
}
