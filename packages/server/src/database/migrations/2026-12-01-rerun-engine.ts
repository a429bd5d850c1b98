import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Which engine computed a rerun: it may be a newer one than the record's. */
export class RerunEngine1796083207000 implements MigrationInterface {
  readonly name = 'RerunEngine1796083207000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query('alter table rerun add column engine text');
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('alter table rerun drop column engine');
  }
}
