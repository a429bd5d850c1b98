import { Column, Entity, PrimaryColumn } from 'typeorm';
import { now, optionalTime } from '../../../database/columns.ts';

/** Someone with an account. */
@Entity('person')
export class PersonEntity {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id!: string;

  /** Trimmed and in lower case. */
  @Column({ type: 'text' })
  email!: string;

  @Column({ type: 'text' })
  name!: string;

  /** 0..5: which of the six people colours. */
  @Column({ type: 'smallint' })
  hue!: number;

  @Column({ name: 'password_hash', type: 'text' })
  passwordHash!: string;

  @Column({ type: 'boolean', default: false })
  operator!: boolean;

  /** When the address was proven; null until then. */
  @Column({ name: 'confirmed_at', ...optionalTime })
  confirmedAt!: Date | null;

  @Column({ name: 'created_at', ...now })
  createdAt!: Date;

  @Column({ name: 'seen_at', ...optionalTime })
  seenAt!: Date | null;
}
