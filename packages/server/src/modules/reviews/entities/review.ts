import type { verdictRequest } from '@stillroom/shared/contracts';
import { Column, Entity, PrimaryColumn } from 'typeorm';
import type * as z from 'zod/mini';
import { now, optionalTime } from '../../../database/columns.ts';

export type ReviewVerdict = z.infer<typeof verdictRequest>;

/** An invited reading of one record. Of its link only the digest is kept. */
@Entity('review')
export class ReviewEntity {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id!: string;

  @Column({ type: 'uuid' })
  record!: string;

  /** Its number among the reviews of the record, from 1: what a masked reviewer is called by. */
  @Column({ type: 'integer' })
  number!: number;

  @Column({ type: 'text' })
  email!: string;

  @Column({ type: 'text' })
  name!: string;

  @Column({ type: 'boolean' })
  masked!: boolean;

  /** Last day the link works, as an ISO date. */
  @Column({ type: 'date' })
  until!: string;

  @Column({ type: 'text' })
  digest!: string;

  @Column({ name: 'invited_by', type: 'uuid' })
  invitedBy!: string;

  @Column({ name: 'invited_at', ...now })
  invitedAt!: Date;

  @Column({ name: 'opened_at', ...optionalTime })
  openedAt!: Date | null;

  @Column({ name: 'withdrawn_at', ...optionalTime })
  withdrawnAt!: Date | null;

  @Column({ type: 'jsonb', nullable: true })
  verdict!: ReviewVerdict | null;

  @Column({ name: 'returned_at', ...optionalTime })
  returnedAt!: Date | null;
}
