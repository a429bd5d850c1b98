import type { MigrationInterface, QueryRunner } from 'typeorm';
import { createSeal } from '../sealed.ts';

/** People, their sessions and tokens, letters, pictures, settings of the installation. */
export class People1796083200000 implements MigrationInterface {
  readonly name = 'People1796083200000';

  async up(runner: QueryRunner): Promise<void> {
    await createSeal(runner);
    await runner.query(`
      create table person (
        id uuid primary key default gen_random_uuid(),
        email text not null unique check (email = lower(email)),
        name text not null,
        hue smallint not null check (hue between 0 and 5),
        password_hash text not null,
        operator boolean not null default false,
        confirmed_at timestamptz,
        created_at timestamptz not null default now(),
        seen_at timestamptz
      )`);
    await runner.query(`
      create table session (
        sid text primary key,
        sess json not null,
        expire timestamptz not null
      )`);
    await runner.query(`create index session_expire on session (expire)`);
    await runner.query(`create index session_person on session ((sess #>> '{passport,user}'))`);
    await runner.query(`
      create table account_token (
        digest text primary key,
        person uuid not null references person on delete cascade,
        purpose text not null check (purpose in ('confirm', 'new-password')),
        until timestamptz not null,
        used_at timestamptz
      )`);
    await runner.query(`create index account_token_person on account_token (person, purpose)`);
    await runner.query(`
      create table password_guess (
        key text primary key,
        failures integer not null,
        last_at timestamptz not null
      )`);
    await runner.query(`
      create table mail (
        id uuid primary key default gen_random_uuid(),
        at timestamptz not null default now(),
        recipient text not null,
        subject text not null,
        text text not null,
        html text not null,
        masked boolean not null default false,
        state text not null default 'waiting' check (state in ('waiting', 'sent', 'failed')),
        attempts integer not null default 0,
        next_at timestamptz not null default now(),
        complaint text
      )`);
    await runner.query(`create index mail_waiting on mail (next_at) where state = 'waiting'`);
    await runner.query(`
      create table picture (
        digest text primary key,
        type text not null,
        bytes bytea not null,
        created_at timestamptz not null default now()
      )`);
    await runner.query(`
      create table picture_place (
        place uuid not null,
        digest text not null references picture,
        primary key (place, digest)
      )`);
    await runner.query(`create table setting (name text primary key, value jsonb not null)`);
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query(`
      drop table setting, picture_place, picture, mail, password_guess, account_token, session, person`);
    await runner.query('drop function refuse_change()');
  }
}
