import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Notebooks: their live document as snapshot and log, the last known state of each cell, remarks. */
export class Notebooks1796083202000 implements MigrationInterface {
  readonly name = 'Notebooks1796083202000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`
      create table notebook (
        id uuid primary key default gen_random_uuid(),
        "group" uuid not null references work_group,
        title text not null,
        subject text not null default 'none',
        opening text not null default '',
        created_at timestamptz not null default now(),
        created_by uuid not null references person,
        last_work_at timestamptz not null default now(),
        last_work_by uuid references person,
        deleted_at timestamptz,
        deleted_by uuid references person,
        public_token text unique
      )`);
    await runner.query(`create index notebook_group on notebook ("group")`);
    await runner.query(`create index notebook_bin on notebook (deleted_at) where deleted_at is not null`);
    await runner.query(`
      create table notebook_snapshot (
        notebook uuid primary key references notebook on delete cascade,
        state bytea not null,
        at timestamptz not null default now()
      )`);
    await runner.query(`
      create table notebook_update (
        id bigint generated always as identity primary key,
        notebook uuid not null references notebook on delete cascade,
        person uuid references person,
        at timestamptz not null default clock_timestamp(),
        update bytea not null
      )`);
    await runner.query(`create index notebook_update_notebook on notebook_update (notebook, id)`);
    await runner.query(`
      create table notebook_author (
        notebook uuid not null references notebook on delete cascade,
        person uuid not null references person,
        last_at timestamptz not null,
        primary key (notebook, person)
      )`);
    await runner.query(`
      create table notebook_cell (
        notebook uuid not null references notebook on delete cascade,
        cell text not null,
        place integer not null,
        kind text not null,
        name text not null,
        state text not null check (state in ('current', 'stale', 'working', 'failed', 'held')),
        digest text,
        shown text,
        error jsonb,
        verdict text check (verdict in ('holds', 'fails', 'undecided')),
        primary key (notebook, cell)
      )`);
    await runner.query(`create index notebook_cell_digest on notebook_cell (digest)`);
    await runner.query(`create index notebook_cell_shown on notebook_cell (shown)`);
    await runner.query(`
      create table remark (
        id uuid primary key default gen_random_uuid(),
        notebook uuid not null references notebook on delete cascade,
        cell text not null,
        quote text not null,
        text text not null,
        by uuid references person,
        review uuid,
        reviewer text,
        record uuid,
        record_number integer,
        at timestamptz not null default now(),
        settled_at timestamptz,
        settled_by uuid references person,
        check ((by is null) <> (review is null)),
        check (num_nulls(review, reviewer, record, record_number) in (0, 4))
      )`);
    await runner.query(`create index remark_notebook on remark (notebook, at)`);
    await runner.query(`
      create table remark_answer (
        id uuid primary key default gen_random_uuid(),
        remark uuid not null references remark on delete cascade,
        text text not null,
        by uuid not null references person,
        at timestamptz not null default now()
      )`);
    await runner.query(`create index remark_answer_remark on remark_answer (remark, at)`);
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query(`
      drop table remark_answer, remark, notebook_cell, notebook_author, notebook_update, notebook_snapshot, notebook`);
  }
}
