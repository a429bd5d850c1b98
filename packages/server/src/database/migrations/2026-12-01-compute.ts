import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Results by digest, runs under way, and what each group has used of the machine. */
export class Compute1796083203000 implements MigrationInterface {
  readonly name = 'Compute1796083203000';

  async up(runner: QueryRunner): Promise<void> {
    // Results stay text: jsonb would write their numbers anew.
    await runner.query(`
      create table cell_result (
        digest text primary key,
        kind text not null,
        engine text not null,
        result text,
        result_digest text,
        error jsonb,
        warnings jsonb not null,
        took real not null,
        at timestamptz not null default now(),
        check ((result is null) = (result_digest is null)),
        check ((error is null) <> (result is null))
      )`);
    // Outcomes that may not be kept: of runs ended from outside, and of cells that stand on such a run.
    await runner.query(`
      create table cell_attempt (
        digest text primary key,
        kind text not null,
        result text,
        result_digest text,
        error jsonb,
        warnings jsonb not null,
        took real not null,
        at timestamptz not null default now()
      )`);
    await runner.query(`
      create table cell_run (
        digest text primary key,
        "group" uuid not null references work_group,
        notebook uuid not null,
        kind text not null,
        name text not null,
        turn integer not null,
        queued_at timestamptz not null default clock_timestamp(),
        started_at timestamptz,
        host text
      )`);
    await runner.query(`create index cell_run_group on cell_run ("group")`);
    await runner.query(`
      create table compute_use (
        "group" uuid not null references work_group,
        day date not null,
        seconds double precision not null,
        runs integer not null,
        primary key ("group", day)
      )`);
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('drop table compute_use, cell_run, cell_attempt, cell_result');
  }
}
