import { Router, json } from 'express';
import type { NextFunction, Request, Response } from 'express';

import { invalidRequest } from '../errors';
import type { Fault } from '../http/faults';
import { isParams } from '../params';
import type { CourierMode } from '../webhooks/courier';
import type { FakeControl, Forgery } from './control';

/** The switches over HTTP: JSON in, JSON out, and only from this machine. */
export function controlRoutes(control: FakeControl): Router {
  const router = Router();
  router.use(onlyFromHere, json());
  const on = (work: (body: Body, req: Request) => unknown) => async (req: Request, res: Response): Promise<void> => {
    const body: unknown = req.body ?? {};
    if (!isParams(body)) throw invalidRequest('The body must be a JSON object.');
    const answer = await work(body, req);
    res.json(answer ?? { done: true });
  };

  router.post('/reset', on(() => control.reset()));
  router.post('/clock', on(async (body) => ({ nowSeconds: await control.advanceClock(number(body, 'advanceSeconds')) })));
  router.get('/faults', on(() => control.faults()));
  router.post('/faults', on((body) => control.addFault(faultOf(body))));
  router.delete('/faults', on(() => control.clearFaults()));
  router.post('/webhooks', on((body) => control.webhooks(modeOf(body))));
  router.post('/webhooks/release', on(() => control.releaseWebhooks()));
  router.post('/webhooks/idle', on(() => control.webhooksIdle()));
  router.get('/webhooks/deliveries', on(() => control.deliveries()));
  router.post('/webhooks/forge', on(async (body) => ({ status: await control.forge(forgeryOf(body)) })));
  router.post('/pay', on((body) => control.pay({
    sessionId: words(body, 'sessionId'),
    cardNumber: words(body, 'cardNumber'),
    ...(body.email === undefined ? {} : { email: words(body, 'email') }),
    ...(typeof body.approve === 'boolean' ? { approve: body.approve } : {}),
  })));
  router.post('/disputes', on(async (body) => ({
    disputeId: await control.openDispute({
      ...(body.chargeId === undefined ? {} : { chargeId: words(body, 'chargeId') }),
      ...(body.paymentIntentId === undefined ? {} : { paymentIntentId: words(body, 'paymentIntentId') }),
      reason: body.reason === undefined ? 'fraudulent' : pick(body, 'reason', ['duplicate', 'fraudulent', 'general', 'product_not_received', 'product_unacceptable']),
    }),
  })));
  router.post('/disputes/:id/close', on((body, req) => control.closeDispute(String(req.params.id), pick(body, 'outcome', ['lost', 'won']))));
  router.post('/refunds/:id/fail', on((_body, req) => control.failRefund(String(req.params.id))));
  router.get('/books', on(() => control.books()));
  return router;
}

type Body = Readonly<Record<string, unknown>>;

/** A page of another site must not reach the switches through a visitor's browser, nor a proxy from outside. */
function onlyFromHere(req: Request, res: Response, next: NextFunction): void {
  const address = req.socket.remoteAddress ?? '';
  const isLoopback = address === '::1' || /^(::ffff:)?127\./.test(address);
  if (isLoopback && req.get('origin') === undefined && req.get('x-forwarded-for') === undefined) next();
  else res.status(403).json({ error: { type: 'invalid_request_error', message: 'The switches are for this machine only.' } });
}

function words(body: Body, name: string): string {
  const value = body[name];
  if (typeof value !== 'string' || value === '') throw invalidRequest(`${name} must be a text.`, { param: name });
  return value;
}

function number(body: Body, name: string): number {
  const value = body[name];
  if (typeof value !== 'number' || !Number.isSafeInteger(value)) throw invalidRequest(`${name} must be a whole number.`, { param: name });
  return value;
}

function pick<const T extends string>(body: Body, name: string, allowed: readonly T[]): T {
  const found = allowed.find((candidate) => candidate === body[name]);
  if (found === undefined) throw invalidRequest(`${name} must be one of ${allowed.join(', ')}.`, { param: name });
  return found;
}

function faultOf(body: Body): Fault {
  return {
    kind: pick(body, 'kind', ['delay', 'dropped', 'error', 'lost-answer']),
    ...(body.path === undefined ? {} : { path: words(body, 'path') }),
    ...(body.method === undefined ? {} : { method: pick(body, 'method', ['GET', 'POST']) }),
    ...(body.times === undefined ? {} : { times: body.times === null ? null : number(body, 'times') }),
    ...(body.status === undefined ? {} : { status: number(body, 'status') }),
    ...(body.delayMs === undefined ? {} : { delayMs: number(body, 'delayMs') }),
  };
}

function modeOf(body: Body): Partial<CourierMode> {
  const mode: Partial<CourierMode> = {};
  for (const name of ['paused', 'doubled', 'reversed'] as const) {
    if (typeof body[name] === 'boolean') mode[name] = body[name];
  }
  for (const name of ['lateMs', 'loseNext'] as const) {
    if (body[name] !== undefined) mode[name] = number(body, name);
  }
  return mode;
}

function forgeryOf(body: Body): Forgery {
  return {
    signature: pick(body, 'signature', ['future', 'none', 'right', 'stale', 'wrong']),
    ...(body.type === undefined ? {} : { type: words(body, 'type') }),
    ...(isParams(body.object) ? { object: { ...body.object } } : {}),
    ...(body.url === undefined ? {} : { url: words(body, 'url') }),
  };
}
