import type { GroupRole, Membership } from '@stillroom/shared/roles';
import { Column, Entity, PrimaryColumn } from 'typeorm';
import { now } from '../../../database/columns.ts';

/** A person's role in a group. */
@Entity('membership')
export class MembershipEntity implements Membership {
  @PrimaryColumn({ type: 'uuid' })
  person!: string;

  @PrimaryColumn({ type: 'uuid' })
  group!: string;

  @Column({ type: 'text' })
  role!: GroupRole;

  /** Notebooks the role is limited to; null: all of the group. */
  @Column({ type: 'uuid', array: true, nullable: true })
  notebooks!: string[] | null;

  @Column(now)
  since!: Date;
}
