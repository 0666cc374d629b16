import { execFile } from 'node:child_process';
import { mkdtemp, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { promisify } from 'node:util';

const run = promisify(execFile);

export interface LabelPicture {
  /** A PNG or PDF: bytes, or the path of a file. */
  source: Buffer | string;
  /** For a PDF: the page, from 1. Default 1. */
  page?: number;
  /** For a PDF: the part of the page to show, in PDF points (1/72 inch) from the top left. Default the whole page. */
  crop?: { x: number; y: number; width: number; height: number };
}

const dpi = 300;

/**
 * Makes what Chromium shows as its camera: a film of someone holding the given labels up, one after the other.
 * @param labels    shown in this order, then from the start again
 * @param secondsEach how long each label is held up, in whole seconds. Default 3: decoding takes about a second
 * @returns the path of a .mjpeg file for `openBrowser({ camera })`
 */
export async function makeCameraFeed(labels: readonly LabelPicture[], secondsEach = 3): Promise<string> {
  const folder = await mkdtemp(path.join(tmpdir(), 'trayward-camera-'));
  const pictures: string[] = [];
  for (const [index, label] of labels.entries()) pictures.push(await toPng(label, path.join(folder, `label${index}`)));

  const inputs = pictures.flatMap((file) => ['-loop', '1', '-t', String(secondsEach), '-i', file]);
  // White paper around the label, as on a bench; a code that fills the frame to its edge has no quiet zone and is not found.
  const frames = pictures.map((_, i) =>
    `[${i}:v]scale=420:340:force_original_aspect_ratio=decrease:flags=lanczos,pad=640:480:(ow-iw)/2:(oh-ih)/2:white,setsar=1,fps=10[f${i}]`);
  const joined = `${pictures.map((_, i) => `[f${i}]`).join('')}concat=n=${pictures.length}:v=1:a=0,format=yuvj420p[out]`;
  const film = path.join(folder, 'camera.mjpeg');
  await run('ffmpeg', ['-v', 'error', '-y', ...inputs, '-filter_complex', `${frames.join(';')};${joined}`,
    '-map', '[out]', '-c:v', 'mjpeg', '-q:v', '2', '-f', 'mjpeg', film]);
  return film;
}

async function toPng({ source, page = 1, crop }: LabelPicture, target: string): Promise<string> {
  const file = typeof source === 'string' ? source : `${target}.in`;
  if (typeof source !== 'string') await writeFile(file, source);
  const bytes = typeof source === 'string' ? undefined : source;
  const isPdf = bytes ? bytes.subarray(0, 5).toString() === '%PDF-' : file.endsWith('.pdf');
  if (!isPdf) return file;
  const pixels = (points: number): string => String(Math.round((points / 72) * dpi));
  const cropping = crop
    ? ['-x', pixels(crop.x), '-y', pixels(crop.y), '-W', pixels(crop.width), '-H', pixels(crop.height)]
    : [];
  await run('pdftoppm', ['-png', '-singlefile', '-r', String(dpi), '-f', String(page), '-l', String(page), ...cropping, file, target]);
  return `${target}.png`;
}
