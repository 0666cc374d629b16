import type { Readable } from 'node:stream';
import type { CookieOptions } from 'express';

export interface ReplyExtras {
  readonly headers?: Readonly<Record<string, string>>;
  readonly cookies?: readonly { readonly name: string; readonly value: string; readonly options: CookieOptions }[];
}

/** An answer that needs more than a body: another status, headers, cookies. */
export class Reply<R> {
  constructor(
    readonly status: number,
    readonly body: R,
    readonly extras: ReplyExtras = {},
  ) {}
}

/** `return reply(202, { state: 'queued' })`. Idempotent routes keep status and body for a replay, not the extras. */
export function reply<R>(status: number, body: R, extras?: ReplyExtras): Reply<R> {
  return new Reply(status, body, extras);
}

/** An answer that is not JSON: a PDF, a photo, a CSV. */
export class FileReply {
  constructor(
    readonly body: Buffer | Readable,
    readonly about: FileAbout,
  ) {}
}

export interface FileAbout {
  /** e.g. `application/pdf` */
  readonly type: string;
  /** Sent as a download of this name when given, else shown inline. */
  readonly downloadName?: string;
  /** Seconds the browser (never a shared cache) may keep it; 0 when left out. */
  readonly maxAgeSeconds?: number;
}

/** `return file(pdf, { type: 'application/pdf', downloadName: 'labels.pdf' })` */
export function file(body: Buffer | Readable, about: FileAbout): FileReply {
  return new FileReply(body, about);
}
