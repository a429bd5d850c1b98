import type { MigrationInterface, QueryRunner } from 'typeorm';
import { seal } from '../sealed.ts';

/** Frozen records, sealed; their public links; reviews with their reruns. */
export class Records1796083204000 implements MigrationInterface {
  readonly name = 'Records1796083204000';

  async up(runner: QueryRunner): Promise<void> {
    // No reference to the notebook: a record outlives it.
    await runner.query(`
      create table record (
        id uuid primary key default gen_random_uuid(),
        "group" uuid not null references work_group,
        number integer not null,
        notebook uuid not null,
        title text not null,
        frozen_at timestamptz not null,
        frozen_by uuid not null references person,
        digest text not null,
        content text not null,
        unique ("group", number)
      )`);
    await runner.query(`create index record_notebook on record (notebook)`);
    await seal(runner, 'record');
    await runner.query(`
      create table record_link (
        record uuid primary key references record,
        token text not null unique,
        at timestamptz not null default now()
      )`);
    await runner.query(`
      create table review (
        id uuid primary key default gen_random_uuid(),
        record uuid not null references record,
        number integer not null,
        email text not null,
        name text not null,
        masked boolean not null,
        until date not null,
        digest text not null unique,
        invited_by uuid not null references person,
        invited_at timestamptz not null default now(),
        opened_at timestamptz,
        withdrawn_at timestamptz,
        verdict jsonb,
        returned_at timestamptz,
        unique (record, number),
        check ((verdict is null) = (returned_at is null))
      )`);
    await runner.query(`
      create table rerun (
        id uuid primary key default gen_random_uuid(),
        review uuid not null references review on delete cascade,
        cell text,
        at timestamptz not null default clock_timestamp(),
        host text,
        done_at timestamptz
      )`);
    await runner.query(`create index rerun_review on rerun (review, at)`);
    await runner.query(`
      create table rerun_cell (
        rerun uuid not null references rerun on delete cascade,
        cell text not null,
        outcome text not null check (outcome in ('waiting', 'working', 'matches', 'differs', 'failed')),
        why text,
        result text,
        primary key (rerun, cell)
      )`);
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('drop table rerun_cell, rerun, review, record_link, record');
  }
}
