import { randomUUID } from 'node:crypto';
import type { RequestHandler, Response } from 'express';

/** A proxy in front may name the request; anything that is not a plain short id could forge log lines, so it is replaced. */
const acceptable = /^[A-Za-z0-9_-]{8,64}$/;

/** Gives every request an id, sent back as `X-Request-Id` and repeated in problem documents and logs. */
export const requestId: RequestHandler = (request, response, next) => {
  const offered = request.get('x-request-id');
  const id = offered !== undefined && acceptable.test(offered) ? offered : randomUUID();
  response.locals['requestId'] = id;
  response.set('X-Request-Id', id);
  next();
};

export function requestIdOf(response: Response): string {
  return String(response.locals['requestId'] ?? '');
}
