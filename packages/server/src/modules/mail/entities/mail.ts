import { Column, Entity, PrimaryColumn } from 'typeorm';
import { now } from '../../../database/columns.ts';
import type { LetterKey } from '../letter.ts';

/** A letter in the outbox. */
@Entity('mail')
export class MailEntity {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id!: string;

  @Column(now)
  at!: Date;

  @Column({ type: 'text' })
  recipient!: string;

  @Column({ type: 'text' })
  subject!: string;

  @Column({ type: 'text' })
  text!: string;

  @Column({ type: 'text' })
  html!: string;

  /** Whether it goes to a masked reviewer, whose address is shown only with the letter itself. */
  @Column({ type: 'boolean', default: false })
  masked!: boolean;

  /** What its link opens; only a letter that opens nothing is shown without being asked for. */
  @Column({ type: 'text', default: 'nothing' })
  opens!: LetterKey;

  /** The group whose trail tells that it was shown. */
  @Column({ type: 'uuid', nullable: true })
  group!: string | null;

  /** What a masked reviewer is called. */
  @Column({ type: 'text', nullable: true })
  reader!: string | null;

  @Column({ type: 'text', default: 'waiting' })
  state!: 'waiting' | 'sent' | 'failed';

  @Column({ type: 'integer', default: 0 })
  attempts!: number;

  @Column({ name: 'next_at', ...now })
  nextAt!: Date;

  /** What the mail server said at the last failure. */
  @Column({ type: 'text', nullable: true })
  complaint!: string | null;
}
