import { Column, Entity, PrimaryColumn } from 'typeorm';
import { now, optionalTime } from '../../../database/columns.ts';

/** A comment on a cell: by a member, or out of a review of one of the notebook's records. */
@Entity('remark')
export class RemarkEntity {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id!: string;

  @Column({ type: 'uuid' })
  notebook!: string;

  @Column({ type: 'text' })
  cell!: string;

  /** The words it is about, empty for the whole cell. */
  @Column({ type: 'text' })
  quote!: string;

  @Column({ type: 'text' })
  text!: string;

  /** The member; null where it comes from a review. */
  @Column({ type: 'uuid', nullable: true })
  by!: string | null;

  /** The review; with it the reviewer's name as the authors may see it, and the record. */
  @Column({ type: 'uuid', nullable: true })
  review!: string | null;

  @Column({ name: 'reviewer', type: 'text', nullable: true })
  reviewer!: string | null;

  @Column({ type: 'uuid', nullable: true })
  record!: string | null;

  @Column({ name: 'record_number', type: 'integer', nullable: true })
  recordNumber!: number | null;

  @Column(now)
  at!: Date;

  @Column({ name: 'settled_at', ...optionalTime })
  settledAt!: Date | null;

  @Column({ name: 'settled_by', type: 'uuid', nullable: true })
  settledBy!: string | null;
}

@Entity('remark_answer')
export class RemarkAnswerEntity {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id!: string;

  @Column({ type: 'uuid' })
  remark!: string;

  @Column({ type: 'text' })
  text!: string;

  @Column({ type: 'uuid' })
  by!: string;

  @Column(now)
  at!: Date;
}
