import { Column, Entity, PrimaryColumn } from 'typeorm';

/** One line of a group's trail. The table is sealed: lines are added, never altered. */
@Entity('audit')
export class AuditEntity {
  @PrimaryColumn({ type: 'bigint', generated: 'identity' })
  id!: string;

  @Column({ type: 'uuid' })
  group!: string;

  @Column({ type: 'timestamptz', default: () => 'clock_timestamp()' })
  at!: Date;

  @Column({ type: 'uuid', nullable: true })
  by!: string | null;

  @Column({ type: 'text' })
  verb!: string;

  /** A whole sentence without the person. */
  @Column({ type: 'text' })
  words!: string;
}
