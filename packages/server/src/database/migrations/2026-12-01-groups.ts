import type { MigrationInterface, QueryRunner } from 'typeorm';
import { seal } from '../sealed.ts';

/** Groups, who is in them, who is invited, and the trail of who did what. */
export class Groups1796083201000 implements MigrationInterface {
  readonly name = 'Groups1796083201000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`
      create table work_group (
        id uuid primary key default gen_random_uuid(),
        name text not null,
        hue smallint not null check (hue between 0 and 5),
        created_at timestamptz not null default now()
      )`);
    await runner.query(`
      create table membership (
        "group" uuid not null references work_group,
        person uuid not null references person,
        role text not null check (role in ('lead', 'author', 'remarker', 'reader')),
        notebooks uuid[],
        since timestamptz not null default now(),
        primary key (person, "group")
      )`);
    await runner.query(`create index membership_group on membership ("group")`);
    await runner.query(`
      create table invitation (
        id uuid primary key default gen_random_uuid(),
        digest text not null unique,
        "group" uuid not null references work_group,
        email text not null,
        role text not null check (role in ('lead', 'author', 'remarker', 'reader')),
        notebooks uuid[],
        message text not null,
        by uuid not null references person,
        at timestamptz not null default now(),
        until timestamptz not null,
        used_at timestamptz,
        withdrawn_at timestamptz
      )`);
    await runner.query(`create index invitation_group on invitation ("group")`);
    await runner.query(`
      create table audit (
        id bigint generated always as identity primary key,
        "group" uuid not null references work_group,
        at timestamptz not null default clock_timestamp(),
        by uuid references person,
        verb text not null,
        words text not null
      )`);
    await runner.query(`create index audit_group on audit ("group", id)`);
    await seal(runner, 'audit');
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('drop table audit, invitation, membership, work_group');
  }
}
