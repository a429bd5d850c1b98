import type { EntityManager } from 'typeorm';
import { announce } from '../../../events.ts';
import { notFound } from '../../../errors.ts';
import { RemarkAnswerEntity, RemarkEntity } from '../entities/remark.ts';

/** Words on a cell, or on some of its words. */
export interface RemarkWords {
  readonly cell: string;
  readonly quote: string;
  readonly text: string;
}

/** Who a remark out of a review is from, as the authors may know. */
export interface RemarkReview {
  readonly review: string;
  readonly reviewer: string;
  readonly record: string;
  readonly recordNumber: number;
}

/** Writes a remark on a cell of a notebook, by a member or out of a review. */
export async function writeRemark(
  manager: EntityManager,
  notebook: string,
  words: RemarkWords,
  from: { readonly by: string } | RemarkReview,
): Promise<RemarkEntity> {
  const remark = await manager.save(manager.create(RemarkEntity, { notebook, ...words, ...from }));
  await announce(manager, 'remarks.changed', { notebook });
  return manager.findOneByOrFail(RemarkEntity, { id: remark.id });
}

/** Answers a remark. @throws not-found */
export async function answerRemark(
  manager: EntityManager,
  by: string,
  notebook: string,
  remark: string,
  text: string,
): Promise<RemarkEntity> {
  const found = await pickRemark(manager, notebook, remark);
  await manager.insert(RemarkAnswerEntity, { remark, by, text });
  await announce(manager, 'remarks.changed', { notebook });
  return found;
}

/** Settles a remark, or opens it again. @throws not-found */
export async function settleRemark(
  manager: EntityManager,
  by: string,
  notebook: string,
  remark: string,
  settled: boolean,
): Promise<RemarkEntity> {
  const found = await pickRemark(manager, notebook, remark);
  const change = settled ? { settledAt: new Date(), settledBy: by } : { settledAt: null, settledBy: null };
  await manager.update(RemarkEntity, { id: remark }, change);
  await announce(manager, 'remarks.changed', { notebook });
  return Object.assign(found, change);
}

async function pickRemark(manager: EntityManager, notebook: string, id: string): Promise<RemarkEntity> {
  const remark = await manager.findOneBy(RemarkEntity, { id, notebook });
  if (remark === null) throw notFound('remark');
  return remark;
}
