import { Column, Entity, PrimaryColumn } from 'typeorm';

/** A frozen notebook. The table is sealed: a record is added and never altered. */
@Entity('record')
export class RecordEntity {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id!: string;

  @Column({ type: 'uuid' })
  group!: string;

  /** Its number in the group, from 1. */
  @Column({ type: 'integer' })
  number!: number;

  /** The notebook it was frozen from, which may be gone. */
  @Column({ type: 'uuid' })
  notebook!: string;

  @Column({ type: 'text' })
  title!: string;

  @Column({ name: 'frozen_at', type: 'timestamptz' })
  frozenAt!: Date;

  @Column({ name: 'frozen_by', type: 'uuid' })
  frozenBy!: string;

  /** "sha256:…" of the content. */
  @Column({ type: 'text' })
  digest!: string;

  /** RFC 8785 JSON of a `RecordContent`. Long: lists leave it out. */
  @Column({ type: 'text', select: false })
  content!: string;
}

/** The public link of a record; closing it takes the line away. */
@Entity('record_link')
export class RecordLinkEntity {
  @PrimaryColumn({ type: 'uuid' })
  record!: string;

  @Column({ type: 'text' })
  token!: string;
}
