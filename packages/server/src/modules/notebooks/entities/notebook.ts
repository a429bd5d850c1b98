import { Column, Entity, PrimaryColumn } from 'typeorm';
import { now, optionalTime } from '../../../database/columns.ts';

/** What is known of a notebook beside its live document; title, subject and opening are copied from there. */
@Entity('notebook')
export class NotebookEntity {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id!: string;

  @Column({ type: 'uuid' })
  group!: string;

  @Column({ type: 'text' })
  title!: string;

  @Column({ type: 'text' })
  subject!: string;

  /** First words of its first prose cell. */
  @Column({ type: 'text' })
  opening!: string;

  @Column({ name: 'created_at', ...now })
  createdAt!: Date;

  @Column({ name: 'created_by', type: 'uuid' })
  createdBy!: string;

  /** As of the last compaction; what the log holds is later. */
  @Column({ name: 'last_work_at', ...now })
  lastWorkAt!: Date;

  @Column({ name: 'last_work_by', type: 'uuid', nullable: true })
  lastWorkBy!: string | null;

  /** When it was put into the bin; it is taken away for good 30 days later. */
  @Column({ name: 'deleted_at', ...optionalTime })
  deletedAt!: Date | null;

  @Column({ name: 'deleted_by', type: 'uuid', nullable: true })
  deletedBy!: string | null;

  /** Opens the fair copy to everybody. Kept readable, since the lead is shown the link again. */
  @Column({ name: 'public_token', type: 'text', nullable: true })
  publicToken!: string | null;
}
