import { pipeline } from 'node:stream/promises';
import type { Response } from 'express';
import type { AnyRoute } from './route';
import { FileReply, Reply } from './reply';

/** Writes what a handler returned. API answers are a person's own and are never kept by a cache unless the route says so. */
export async function send(response: Response, declared: AnyRoute, answer: unknown): Promise<void> {
  if (answer instanceof FileReply) return sendFile(response, answer);
  response.set('Cache-Control', 'no-store');
  const { status, body } = answer instanceof Reply ? { status: answer.status, body: answer.body as unknown } : { status: declared.status, body: answer };
  if (answer instanceof Reply) {
    response.set(answer.extras.headers ?? {});
    for (const { name, value, options } of answer.extras.cookies ?? []) response.cookie(name, value, options);
  }
  response.status(status);
  if (body === undefined || body === null) response.end();
  else response.json(body);
}

async function sendFile(response: Response, { body, about }: FileReply): Promise<void> {
  response.status(200).type(about.type);
  response.set('Cache-Control', about.maxAgeSeconds === undefined ? 'no-store' : `private, max-age=${about.maxAgeSeconds}`);
  // A stored file is data, whatever it claims to be: no scripts run in it and nothing sniffs its type.
  response.set('Content-Security-Policy', "default-src 'none'; style-src 'unsafe-inline'; sandbox");
  if (about.downloadName !== undefined) response.attachment(about.downloadName);
  response.type(about.type);
  if (Buffer.isBuffer(body)) response.send(body);
  else await pipeline(body, response);
}
