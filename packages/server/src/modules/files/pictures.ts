import { createHash } from 'node:crypto';
import { limits } from '@stillroom/shared/protocol';
import type { RequestHandler, Response } from 'express';
import multer from 'multer';
import type { EntityManager } from 'typeorm';
import { invalid, notFound } from '../../errors.ts';
import { PictureEntity, PicturePlaceEntity } from './entities/picture.ts';
import { sniffPicture } from './sniff.ts';

/** Reads one uploaded file of the multipart field `picture` into memory, within the limit; it is at `request.file`. */
export const receivePicture: RequestHandler = multer({
  storage: multer.memoryStorage(),
  limits: { fileSize: limits.picture, files: 1, fields: 4, fieldSize: 1024 },
}).single('picture');

/**
 * Keeps a picture under its digest and lets it be seen at `place` (a notebook's or record's id).
 * @throws invalid where the bytes are no picture, whatever the file is called.
 */
export async function keepPicture(
  manager: EntityManager,
  bytes: Buffer | undefined,
  place: string,
): Promise<{ readonly digest: string }> {
  if (bytes === undefined) throw invalid('No picture came with the request.');
  const type = sniffPicture(bytes);
  if (type === null) {
    throw invalid('That file is not a picture that can be shown.', {
      hint: 'Save it as PNG, JPEG, GIF, WebP or AVIF, then choose it again.',
    });
  }
  const digest = createHash('sha256').update(bytes).digest('hex');
  await manager
    .createQueryBuilder()
    .insert()
    .into(PictureEntity)
    .values({ digest, type, bytes })
    .orIgnore()
    .execute();
  await placePicture(manager, digest, place);
  return { digest };
}

/** Lets a kept picture be seen at one more place, as when a notebook is frozen or imported. */
export async function placePicture(manager: EntityManager, digest: string, place: string): Promise<void> {
  await manager
    .createQueryBuilder()
    .insert()
    .into(PicturePlaceEntity)
    .values({ place, digest })
    .orIgnore()
    .execute();
}

/** Digests of all pictures at a place. */
export async function picturesAt(manager: EntityManager, place: string): Promise<string[]> {
  const places = await manager.findBy(PicturePlaceEntity, { place });
  return places.map(({ digest }) => digest);
}

/**
 * Answers with a picture of a place, to be kept for ever: its address names its content.
 * @throws not-found where the place has no such picture.
 */
export async function sendPicture(
  manager: EntityManager,
  response: Response,
  place: string,
  digest: string,
): Promise<void> {
  const placed = await manager.existsBy(PicturePlaceEntity, { place, digest });
  const picture = placed ? await manager.findOneBy(PictureEntity, { digest }) : null;
  if (picture === null) throw notFound('picture');
  response
    .set('Cache-Control', 'private, max-age=31536000, immutable')
    .set('Content-Disposition', 'inline')
    .type(picture.type)
    .send(picture.bytes);
}
