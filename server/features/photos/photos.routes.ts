import type { PhotoView } from '@shared/api/kits';
import { file, type FileReply } from '@/server/http/reply';
import { fileOf, nothing, route, schema } from '@/server/http/route';
import { PHOTO_MAX_BYTES } from '@/server/storage/photo';
import type { StoredFile } from '@/server/storage/storage.port';
import { PhotoFormDto } from './photos.dto';
import { addPhoto, openPhoto, removePhoto } from './photos.service';

/** A photo never changes under its id, but who may see it does. */
const maxAgeSeconds = 300;

const asReply = ({ stream, mime }: StoredFile): FileReply => file(stream, { type: mime, maxAgeSeconds });

export const photosRoutes = [
  route({
    method: 'post', path: '/stones/:stoneId/photos', permission: 'photo:write', summary: 'Add a photo of a stone (JPEG, PNG or WebP, at most 8 MB)',
    // The parser lets a little more in than is kept, so that a photo just too large is refused by its field's name.
    transaction: 'none', files: { field: 'photo', maxCount: 1, maxBytes: 2 * PHOTO_MAX_BYTES },
    request: PhotoFormDto, response: schema<PhotoView>('PhotoView'), status: 201, idempotent: false,
    handle: ({ db, services, actor, params, body, files, now }) =>
      addPhoto(db, services.storage, actor, { stoneId: params.stoneId, file: files[0], note: body.note ?? '', loanId: body.loanId ?? null }, now),
  }),
  route({
    method: 'get', path: '/photos/:photoId', permission: 'photo:read', summary: 'A photo',
    transaction: 'none', response: fileOf('image/webp'), idempotent: false,
    handle: async ({ db, services, actor, params }) => asReply(await openPhoto(db, services.storage, actor, { photoId: params.photoId, small: false })),
  }),
  route({
    method: 'get', path: '/photos/:photoId/thumbnail', permission: 'photo:read', summary: 'A photo, small',
    transaction: 'none', response: fileOf('image/webp'), idempotent: false,
    handle: async ({ db, services, actor, params }) => asReply(await openPhoto(db, services.storage, actor, { photoId: params.photoId, small: true })),
  }),
  route({
    method: 'delete', path: '/photos/:photoId', permission: 'photo:write', summary: 'Take a photo out of sight',
    response: nothing(), idempotent: false,
    handle: async ({ tx, actor, params, now }) => {
      await removePhoto(tx, actor, params.photoId, now);
      return undefined;
    },
  }),
];
