import { deflateSync } from 'node:zlib';
import sharp from 'sharp';
import { PhotoRefused, processPhoto, PHOTO_MAX_BYTES } from '@/server/storage/photo';

const plain = (width: number, height: number) =>
  sharp({ create: { width, height, channels: 3, background: { r: 120, g: 160, b: 210 } } });

/** A photo as a phone would send it: left half red, right half blue, with camera, place and rotation in EXIF. */
async function phonePhoto(orientation: number): Promise<Buffer> {
  const [red, blue] = await Promise.all(['red', 'blue'].map((background) => sharp({ create: { width: 1000, height: 1500, channels: 3, background } }).png().toBuffer()));
  return sharp({ create: { width: 2000, height: 1500, channels: 3, background: 'white' } })
    .composite([{ input: red ?? Buffer.alloc(0), left: 0, top: 0 }, { input: blue ?? Buffer.alloc(0), left: 1000, top: 0 }])
    .withExif({ IFD0: { Make: 'PhoneMaker', Copyright: 'A Student' }, IFD3: { GPSLatitude: '54/1 0/1 0/1', GPSLongitude: '7/1 0/1 0/1' } })
    .withMetadata({ orientation })
    .jpeg()
    .toBuffer();
}

async function faultOf(upload: Buffer): Promise<string> {
  try {
    await processPhoto(upload);
    return 'taken';
  } catch (error) {
    if (error instanceof PhotoRefused) return error.fault;
    throw error;
  }
}

/** A PNG that claims to be `width` × `height` and holds next to nothing: the shape of a decompression bomb. */
function bombPng(width: number, height: number): Buffer {
  const crcTable = Array.from({ length: 256 }, (_, n) => {
    let c = n;
    for (let k = 0; k < 8; k += 1) c = c & 1 ? 0xedb88320 ^ (c >>> 1) : c >>> 1;
    return c >>> 0;
  });
  const chunk = (type: string, data: Buffer): Buffer => {
    const body = Buffer.concat([Buffer.from(type, 'latin1'), data]);
    let crc = 0xffffffff;
    for (const byte of body) crc = (crcTable[(crc ^ byte) & 0xff] ?? 0) ^ (crc >>> 8);
    const frame = Buffer.alloc(8);
    frame.writeUInt32BE(data.length, 0);
    frame.writeUInt32BE((crc ^ 0xffffffff) >>> 0, 4);
    return Buffer.concat([frame.subarray(0, 4), body, frame.subarray(4)]);
  };
  const header = Buffer.alloc(13);
  header.writeUInt32BE(width, 0);
  header.writeUInt32BE(height, 4);
  header.set([1, 0, 0, 0, 0], 8);
  const rows = deflateSync(Buffer.alloc(Math.min(height, 4000) * (Math.ceil(width / 8) + 1)));
  return Buffer.concat([Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]), chunk('IHDR', header), chunk('IDAT', rows), chunk('IEND', Buffer.alloc(0))]);
}

describe('a photo', () => {
  it('comes out as WebP of at most 1600 px, with a version of at most 320 px', async () => {
    const photo = await processPhoto(await plain(4000, 3000).jpeg().toBuffer());
    expect(photo).toMatchObject({ mime: 'image/webp', large: { width: 1600, height: 1200 }, small: { width: 320, height: 240 } });
    expect((await sharp(photo.large.content).metadata()).format).toBe('webp');
    expect((await sharp(photo.small.content).metadata()).width).toBe(320);
  });

  it('is never enlarged', async () => {
    expect(await processPhoto(await plain(200, 100).png().toBuffer())).toMatchObject({ large: { width: 200, height: 100 }, small: { width: 200, height: 100 } });
  });

  it.each(['jpeg', 'png', 'webp'] as const)('may be %s', async (format) => {
    expect(await faultOf(await plain(300, 200).toFormat(format).toBuffer())).toBe('taken');
  });

  it('loses place, camera and owner', async () => {
    const upload = await phonePhoto(1);
    expect((await sharp(upload).metadata()).exif?.includes('PhoneMaker')).toBe(true);
    for (const { content } of Object.values(await processPhoto(upload)).filter((part): part is { content: Buffer; width: number; height: number } => typeof part === 'object')) {
      const metadata = await sharp(content).metadata();
      expect([metadata.exif, metadata.xmp, metadata.iptc, metadata.orientation]).toEqual([undefined, undefined, undefined, undefined]);
      expect(content.includes('PhoneMaker')).toBe(false);
      expect(content.includes('A Student')).toBe(false);
    }
  });

  it('is turned the way the camera was held', async () => {
    // EXIF orientation 6: the top of the scene is at the right of the stored picture, so red (left) ends up on top.
    const { large } = await processPhoto(await phonePhoto(6));
    expect([large.width, large.height]).toEqual([1200, 1600]);
    const { data, info } = await sharp(large.content).raw().toBuffer({ resolveWithObject: true });
    const at = (x: number, y: number): number[] => [...data.subarray((y * info.width + x) * info.channels, (y * info.width + x) * info.channels + 3)];
    expect(at(600, 100)[0]).toBeGreaterThan(200);
    expect(at(600, 1500)[2]).toBeGreaterThan(200);
  });
});

describe('a file is refused, saying why,', () => {
  it('when it is empty', async () => expect(await faultOf(Buffer.alloc(0))).toBe('empty'));
  it('when it is over 8 MB', async () => expect(await faultOf(Buffer.alloc(PHOTO_MAX_BYTES + 1))).toBe('too_large'));
  it('when it is not a picture, whatever its first bytes pretend', async () => {
    expect(await faultOf(Buffer.from('<html><script>alert(1)</script></html>'))).toBe('not_an_image');
    expect(await faultOf(Buffer.concat([Buffer.from([0xff, 0xd8, 0xff, 0xe0]), Buffer.alloc(500)]))).toBe('not_an_image');
  });
  it('when it is a picture of another kind, vector drawings with scripts among them', async () => {
    expect(await faultOf(await plain(50, 50).gif().toBuffer())).toBe('wrong_type');
    expect(await faultOf(await plain(50, 50).tiff().toBuffer())).toBe('wrong_type');
    expect(await faultOf(Buffer.from('<svg xmlns="http://www.w3.org/2000/svg" width="9" height="9"><script>1</script></svg>'))).toBe('wrong_type');
  });
  it('when it unpacks to more than 40 million pixels, before it is unpacked', async () => {
    const bomb = bombPng(40_000, 40_000);
    expect(bomb.length).toBeLessThan(200_000);
    const startedMs = performance.now();
    expect(await faultOf(bomb)).toBe('too_many_pixels');
    expect(performance.now() - startedMs).toBeLessThan(2000);
  });
  it('when it ends in the middle', async () => {
    const whole = await sharp({ create: { width: 800, height: 600, channels: 3, background: 'red', noise: { type: 'gaussian', mean: 128, sigma: 60 } } }).png().toBuffer();
    expect(await faultOf(whole.subarray(0, Math.floor(whole.length / 2)))).toBe('damaged');
  });
  it('in words that end with the next step', () => {
    expect(new PhotoRefused('wrong_type').message).toMatch(/send it again\.$/);
  });
});
