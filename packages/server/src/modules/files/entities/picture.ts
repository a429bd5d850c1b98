import { Column, Entity, PrimaryColumn } from 'typeorm';
import { now } from '../../../database/columns.ts';

/** A picture by what it is: two uploads of the same bytes are one. */
@Entity('picture')
export class PictureEntity {
  /** SHA-256 of the bytes, in hex. */
  @PrimaryColumn({ type: 'text' })
  digest!: string;

  @Column({ type: 'text' })
  type!: string;

  @Column({ type: 'bytea' })
  bytes!: Buffer;

  @Column({ name: 'created_at', ...now })
  createdAt!: Date;
}

/** Where a picture may be seen: the notebook or record it was put into. */
@Entity('picture_place')
export class PicturePlaceEntity {
  @PrimaryColumn({ type: 'uuid' })
  place!: string;

  @PrimaryColumn({ type: 'text' })
  digest!: string;
}
