import { Column, Entity, PrimaryColumn } from 'typeorm';
import { optionalTime, time } from '../../../database/columns.ts';

export type TokenPurpose = 'confirm' | 'new-password';

/** A link sent by mail, good once. Only the digest of the token is kept. */
@Entity('account_token')
export class AccountTokenEntity {
  @PrimaryColumn({ type: 'text' })
  digest!: string;

  @Column({ type: 'uuid' })
  person!: string;

  @Column({ type: 'text' })
  purpose!: TokenPurpose;

  @Column(time)
  until!: Date;

  @Column({ name: 'used_at', ...optionalTime })
  usedAt!: Date | null;
}
