import { Column, Entity, PrimaryColumn } from 'typeorm';
import { now } from '../../../database/columns.ts';

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

  /** Whether the words may be shown to nobody but the recipient: the link of a masked reviewer. */
  @Column({ type: 'boolean', default: false })
  masked!: boolean;

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
