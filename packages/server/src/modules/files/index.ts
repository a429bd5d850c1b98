import { PictureEntity, PicturePlaceEntity } from './entities/picture.ts';

export { keepPicture, picturesAt, placePicture, receivePicture, sendPicture } from './pictures.ts';
export const fileEntities = [PictureEntity, PicturePlaceEntity];
