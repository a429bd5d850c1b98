import type { MigrationInterface, QueryRunner } from 'typeorm';
import { seal } from '../sealed.ts';

/**
 * What the link of a letter opens, so that the outbox shows no such letter by itself; the sealed trail of those that were
 * shown on request. The words of letters that were delivered are taken out.
 */
export class Letters1796083208000 implements MigrationInterface {
  readonly name = 'Letters1796083208000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`
      alter table mail
        add column opens text not null default 'nothing' check (opens in ('nothing', 'account', 'group', 'record')),
        add column "group" uuid,
        add column reader text`);
    await runner.query(`
      update mail set opens = case
        when masked or subject like 'To review: %' then 'record'
        when subject in ('Set a new password for Stillroom', 'Confirm your address for Stillroom') then 'account'
        when subject like '% invites you to % on Stillroom' then 'group'
        else 'nothing' end`);
    await runner.query(`update mail set reader = 'A masked reviewer' where masked`);
    await runner.query(`update mail set text = '', html = '' where state = 'sent' and opens <> 'nothing'`);
    await runner.query(`
      create table letter_showing (
        id bigint generated always as identity primary key,
        mail uuid not null,
        at timestamptz not null default clock_timestamp(),
        by uuid not null references person,
        person uuid references person,
        subject text not null
      )`);
    await runner.query(`create index letter_showing_mail on letter_showing (mail)`);
    await runner.query(
      `create index letter_showing_person on letter_showing (person) where person is not null`,
    );
    await seal(runner, 'letter_showing');
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('drop table letter_showing');
    await runner.query('alter table mail drop column opens, drop column "group", drop column reader');
  }
}
