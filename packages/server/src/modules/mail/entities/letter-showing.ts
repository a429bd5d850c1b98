import { Column, Entity, PrimaryColumn } from 'typeorm';

/** A letter that an operator was shown on request. The table is sealed: lines are added, never altered. */
@Entity('letter_showing')
export class LetterShowingEntity {
  @PrimaryColumn({ type: 'bigint', generated: 'identity' })
  id!: string;

  @Column({ type: 'uuid' })
  mail!: string;

  @Column({ type: 'timestamptz', default: () => 'clock_timestamp()' })
  at!: Date;

  /** The operator. */
  @Column({ type: 'uuid' })
  by!: string;

  /** Whose account the link of the letter opens; null where it opens none. */
  @Column({ type: 'uuid', nullable: true })
  person!: string | null;

  @Column({ type: 'text' })
  subject!: string;
}
