import { Column, Entity, PrimaryColumn } from 'typeorm';
import { now } from '../../../database/columns.ts';

/** People who share notebooks. */
@Entity('work_group')
export class GroupEntity {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id!: string;

  @Column({ type: 'text' })
  name!: string;

  /** 0..5: ground of the spine. */
  @Column({ type: 'smallint' })
  hue!: number;

  @Column({ name: 'created_at', ...now })
  createdAt!: Date;
}
