import sharp, { type Metadata, type Sharp } from 'sharp';

/** Limits of an uploaded photo; `PHOTO_MAX_BYTES` is also the upload parser's. */
export const PHOTO_MAX_BYTES = 8 * 1024 * 1024;
const MAX_PIXELS = 40_000_000;
const LARGE_PX = 1600;
const SMALL_PX = 320;
const WORK_SECONDS = 20;

/** Why a file was not taken as a photo; the words for people are in `message`. */
export type PhotoFault = 'empty' | 'too_large' | 'not_an_image' | 'wrong_type' | 'too_many_pixels' | 'damaged';

const messages: Record<PhotoFault, string> = {
  empty: 'The file is empty. Choose the photo again.',
  too_large: 'The photo is larger than 8 MB. Send a smaller one.',
  not_an_image: 'The file is not a picture. Send a JPEG, PNG or WebP photo.',
  wrong_type: 'Only JPEG, PNG and WebP photos can be kept. Save it as one of these and send it again.',
  too_many_pixels: 'The photo has more than 40 million pixels. Send a smaller one.',
  damaged: 'The photo cannot be read to its end. Take or export it again.',
};

export class PhotoRefused extends Error {
  override readonly name = 'PhotoRefused';
  constructor(readonly fault: PhotoFault) {
    super(messages[fault]);
  }
}

export interface PhotoFile {
  readonly content: Buffer;
  readonly width: number;
  readonly height: number;
}

export interface ProcessedPhoto {
  readonly mime: 'image/webp';
  /** The ending a storage key needs for this type. */
  readonly ending: 'webp';
  /** At most 1600 px on its longer side; never enlarged. */
  readonly large: PhotoFile;
  /** At most 320 px on its longer side. */
  readonly small: PhotoFile;
}

/**
 * Turns an upload into two clean pictures. The type is read from the content, the name never looked at; the picture is
 * decoded and encoded anew, so nothing of the original file is kept: no place, camera, comment or hidden part. The
 * camera's rotation is applied first. Size is read from the header before a pixel is unpacked.
 *
 * @throws PhotoRefused naming what is wrong
 */
export async function processPhoto(upload: Buffer): Promise<ProcessedPhoto> {
  if (upload.length === 0) throw new PhotoRefused('empty');
  if (upload.length > PHOTO_MAX_BYTES) throw new PhotoRefused('too_large');
  checkHeader(await readHeader(upload));
  try {
    // The encoder leaves metadata out unless told otherwise.
    const upright = decoder(upload).autoOrient().toColourspace('srgb');
    const [large, small] = await Promise.all([shrink(upright, LARGE_PX, 82), shrink(upright, SMALL_PX, 74)]);
    return { mime: 'image/webp', ending: 'webp', large, small };
  } catch {
    throw new PhotoRefused('damaged');
  }
}

function decoder(upload: Buffer): Sharp {
  return sharp(upload, { limitInputPixels: MAX_PIXELS, failOn: 'error', pages: 1, sequentialRead: true }).timeout({ seconds: WORK_SECONDS });
}

async function readHeader(upload: Buffer): Promise<Metadata> {
  try {
    return await sharp(upload, { limitInputPixels: false, pages: 1 }).metadata();
  } catch {
    throw new PhotoRefused('not_an_image');
  }
}

function checkHeader({ format, width, height }: Metadata): void {
  if (format !== 'jpeg' && format !== 'png' && format !== 'webp') throw new PhotoRefused('wrong_type');
  if (width * height > MAX_PIXELS) throw new PhotoRefused('too_many_pixels');
}

async function shrink(picture: Sharp, longestPx: number, quality: number): Promise<PhotoFile> {
  const { data, info } = await picture.clone()
    .resize({ width: longestPx, height: longestPx, fit: 'inside', withoutEnlargement: true })
    .webp({ quality })
    .toBuffer({ resolveWithObject: true });
  return { content: data, width: info.width, height: info.height };
}
