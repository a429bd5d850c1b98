import type { GroupRole } from '@stillroom/shared/roles';
import { Column, Entity, PrimaryColumn } from 'typeorm';
import { now, optionalTime, time } from '../../../database/columns.ts';

/** A letter asking someone into a group, good once until its date. Only the digest of its token is kept. */
@Entity('invitation')
export class InvitationEntity {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id!: string;

  @Column({ type: 'text' })
  digest!: string;

  @Column({ type: 'uuid' })
  group!: string;

  @Column({ type: 'text' })
  email!: string;

  @Column({ type: 'text' })
  role!: GroupRole;

  @Column({ type: 'uuid', array: true, nullable: true })
  notebooks!: string[] | null;

  @Column({ type: 'text' })
  message!: string;

  @Column({ type: 'uuid' })
  by!: string;

  @Column(now)
  at!: Date;

  @Column(time)
  until!: Date;

  @Column({ name: 'used_at', ...optionalTime })
  usedAt!: Date | null;

  @Column({ name: 'withdrawn_at', ...optionalTime })
  withdrawnAt!: Date | null;
}
