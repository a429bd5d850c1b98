import type { RerunOutcome } from '@stillroom/shared/contracts';
import { Column, Entity, PrimaryColumn } from 'typeorm';
import { optionalTime } from '../../../database/columns.ts';

/** A rerun that a reviewer asked for. */
@Entity('rerun')
export class RerunEntity {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id!: string;

  @Column({ type: 'uuid' })
  review!: string;

  /** The one cell that was asked for; null for the whole record. */
  @Column({ type: 'text', nullable: true })
  cell!: string | null;

  @Column({ type: 'timestamptz', default: () => 'clock_timestamp()' })
  at!: Date;

  /** The process that runs it, by the name of its connections; null while it waits. */
  @Column({ type: 'text', nullable: true })
  host!: string | null;

  /** Version of the engine that computes it; null while it waits. */
  @Column({ type: 'text', nullable: true })
  engine!: string | null;

  @Column({ name: 'done_at', ...optionalTime })
  doneAt!: Date | null;
}

@Entity('rerun_cell')
export class RerunCellEntity {
  @PrimaryColumn({ type: 'uuid' })
  rerun!: string;

  @PrimaryColumn({ type: 'text' })
  cell!: string;

  @Column({ type: 'text' })
  outcome!: RerunOutcome | 'working' | 'waiting';

  @Column({ type: 'text', nullable: true })
  why!: string | null;

  /** JSON text of a result that differs from the record's. */
  @Column({ type: 'text', nullable: true })
  result!: string | null;
}
