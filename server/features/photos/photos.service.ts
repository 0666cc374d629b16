import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import { IsNull } from 'typeorm';
import type { PhotoView } from '@shared/api/kits';
import { may } from '@shared/permissions';
import type { Database } from '@/server/database/data-source';
import { withSchool } from '@/server/database/school';
import { blindReason, refuseBlind } from '@/server/features/bench/blindness';
import { recordCustody } from '@/server/features/custody/custody.service';
import type { Stone } from '@/server/features/stones/stone.entity';
import { findStone } from '@/server/features/stones/stones.queries';
import { invalid, notFound } from '@/server/http/problem';
import type { SchoolActor, UploadedFile } from '@/server/http/route';
import { PhotoRefused, processPhoto, type ProcessedPhoto } from '@/server/storage/photo';
import { FileNotFound, type StoragePort, type StoredFile } from '@/server/storage/storage.port';
import { storageKey, thumbnailKey } from '@/server/storage/storageKey';
import { Photo } from './photo.entity';
import { photoView } from './photo.queries';

interface Upload { readonly stoneId: string; readonly file: UploadedFile | undefined; readonly note: string; readonly loanId: string | null }

/**
 * Keeps a clean copy of an uploaded photo. No transaction is open while the picture is worked on or stored; where the
 * row cannot be written, the files are taken away again.
 */
export async function addPhoto(db: Database, storage: StoragePort, actor: SchoolActor, upload: Upload, now: Date): Promise<PhotoView> {
  const { stoneId, file, note, loanId } = upload;
  await withSchool(db, actor, (tx) => stoneToPicture(tx, actor, upload));
  if (file === undefined) throw invalid('photo', 'Choose a photo to send.');
  const picture = await cleaned(file.bytes);
  const key = storageKey(actor.schoolId, 'photos', picture.ending);
  try {
    await storage.put(key, picture.large.content, picture.mime);
    await storage.put(thumbnailKey(key), picture.small.content, picture.mime);
    return await withSchool(db, actor, async (tx) => {
      const stone = await stoneToPicture(tx, actor, upload);
      const { width, height } = picture.large;
      const row = tx.create(Photo, {
        id: randomUUID(), schoolId: actor.schoolId, stoneId, loanId, storageKey: key, mime: picture.mime, width, height,
        note: note.trim(), createdBy: actor.accountId, createdAt: now, removedAt: null,
      });
      await tx.insert(Photo, row);
      await recordCustody(tx, { schoolId: actor.schoolId, kitId: stone.kitId, stoneId, kind: 'stone_changed', actorId: actor.accountId, at: now });
      return photoView(row);
    });
  } catch (error) {
    await Promise.all([storage.delete(key), storage.delete(thumbnailKey(key))]);
    throw error;
  }
}

async function cleaned(bytes: Buffer): Promise<ProcessedPhoto> {
  try {
    return await processPhoto(bytes);
  } catch (error) {
    if (error instanceof PhotoRefused) throw invalid('photo', error.message, `photo_${error.fault}`);
    throw error;
  }
}

/** A second reader, blind to the record, may still show what they see; the borrower of a kit adds nothing to its evidence. */
async function stoneToPicture(tx: EntityManager, actor: SchoolActor, { stoneId, loanId }: Upload): Promise<Stone> {
  const stone = await findStone(tx, stoneId);
  if ((await blindReason(tx, actor.accountId, stone.kitId)) === 'own_loan') await refuseBlind(tx, actor.accountId, stone.kitId);
  if (loanId === null) return stone;
  const held = await tx.query<unknown[]>('SELECT 1 FROM loan_stone WHERE loan_id = $1 AND stone_id = $2', [loanId, stoneId]);
  if (held.length === 0) throw invalid('loanId', 'This stone is not part of that loan. Open it from the loan’s check and try again.');
  return stone;
}

async function openStone(tx: EntityManager, actor: SchoolActor, stoneId: string) {
  const stone = await findStone(tx, stoneId);
  await refuseBlind(tx, actor.accountId, stone.kitId);
  return stone;
}

/** The picture itself. For staff who are not blind to the stone's kit; to everybody else there is no such photo. */
export async function openPhoto(db: Database, storage: StoragePort, actor: SchoolActor, wanted: { photoId: string; small: boolean }): Promise<StoredFile> {
  const key = await withSchool(db, actor, async (tx) => {
    const photo = await findPhoto(tx, wanted.photoId);
    const { kitId } = await findStone(tx, photo.stoneId);
    if (!may(actor.roles, 'stone:read') || (await blindReason(tx, actor.accountId, kitId)) !== null) throw noSuchPhoto();
    return photo.storageKey;
  });
  try {
    return await storage.get(wanted.small ? thumbnailKey(key) : key);
  } catch (error) {
    if (error instanceof FileNotFound) throw noSuchPhoto();
    throw error;
  }
}

/** Takes a photo out of sight; its row and file stay, as evidence of what was shown. */
export async function removePhoto(tx: EntityManager, actor: SchoolActor, photoId: string, now: Date): Promise<void> {
  const photo = await findPhoto(tx, photoId);
  const stone = await openStone(tx, actor, photo.stoneId);
  await tx.update(Photo, { id: photoId, removedAt: IsNull() }, { removedAt: now });
  await recordCustody(tx, { schoolId: actor.schoolId, kitId: stone.kitId, stoneId: stone.id, kind: 'stone_changed', actorId: actor.accountId, at: now });
}

async function findPhoto(tx: EntityManager, photoId: string): Promise<Photo> {
  const photo = await tx.findOneBy(Photo, { id: photoId, removedAt: IsNull() });
  if (photo === null) throw noSuchPhoto();
  return photo;
}

const noSuchPhoto = (): Error => notFound('There is no such photo. Go back to the stone.', 'photo_not_found');
