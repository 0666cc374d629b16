import type { EntityManager } from 'typeorm';
import { IsNull } from 'typeorm';
import type { PhotoView } from '@shared/api/kits';
import { Photo } from './photo.entity';

/** The photos of a stone that were not removed, oldest first. Staff only. */
export async function photosOf(tx: EntityManager, stoneId: string): Promise<PhotoView[]> {
  const photos = await tx.find(Photo, { where: { stoneId, removedAt: IsNull() }, order: { createdAt: 'ASC', id: 'ASC' } });
  return photos.map(photoView);
}

export function photoView({ id, width, height, note, createdAt }: Photo): PhotoView {
  return { id, url: `/api/v1/photos/${id}`, thumbnailUrl: `/api/v1/photos/${id}/thumbnail`, width, height, note, createdAt: createdAt.toISOString() };
}
