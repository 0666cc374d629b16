import { setTimeout as sleep } from 'node:timers/promises';

import type { Request, Response } from 'express';

import { fakeApiVersion, newId, shown } from '../bank';
import type { Bank } from '../bank';
import { ApiError } from '../errors';
import { allowOnly, isParams } from '../params';
import type { Params } from '../params';
import { letTimePass } from '../time';
import { expand } from './expand';
import type { Fault, FaultBook } from './faults';
import { requestHash, storeAnswer, storedAnswer } from './idempotency';
import type { Operation } from './operation';

export interface Desk {
  bank: Bank;
  faults: FaultBook;
  /** Resolves when what has happened so far would survive the process. */
  save: () => Promise<void>;
}

interface Answer {
  status: number;
  body: unknown;
  replayed: boolean;
}

/** Handles one API call: credentials, faults, time, the key, the work, then the answer (unless a fault eats it). */
export function serve(desk: Desk, operation: Operation) {
  return async (req: Request, res: Response): Promise<void> => {
    const faults = desk.faults.take(req.method, req.originalUrl);
    if (hit(faults, 'dropped')) {
      req.socket.destroy();
      return;
    }
    const requestId = newId('req', 14);
    const error = hit(faults, 'error');
    const answer = error ? outage(error) : perform(desk, operation, req, requestId);
    await desk.save();
    const delay = hit(faults, 'delay');
    if (delay) await sleep(delay.delayMs ?? 1000);
    if (hit(faults, 'lost-answer')) {
      req.socket.destroy();
      return;
    }
    send(req, res, answer, requestId);
  };
}

export function hit(faults: readonly Fault[], kind: Fault['kind']): Fault | undefined {
  return faults.find((fault) => fault.kind === kind);
}

function outage(fault: Fault): Answer {
  return { status: fault.status ?? 500, body: { error: { type: 'api_error', message: 'An unknown error occurred.' } }, replayed: false };
}

function perform(desk: Desk, operation: Operation, req: Request, requestId: string): Answer {
  const { bank } = desk;
  const key = req.method === 'POST' ? req.get('idempotency-key') : undefined;
  try {
    assertTestKey(req);
    letTimePass(bank);
    const params = paramsOf(req);
    const hash = requestHash(req.path, params);
    const stored = key === undefined ? null : storedAnswer(bank, key, hash);
    if (stored !== null) return { status: stored.status, body: stored.body, replayed: true };
    bank.request = { id: requestId, idempotency_key: key ?? null };
    const answer = runOnce(bank, operation, params, String(req.params.id ?? ''));
    if (key !== undefined) storeAnswer(bank, key, hash, answer.status, answer.body);
    return answer;
  } catch (error) {
    return refused(error);
  } finally {
    bank.request = null;
  }
}

function runOnce(bank: Bank, operation: Operation, params: Params, id: string): Answer {
  try {
    allowOnly(params, operation.fields);
    const result = operation.run({ bank, params, id });
    const body: unknown = 'created' in result ? shown(bank, result) : structuredClone(result);
    expand(bank, body, params);
    return { status: 200, body, replayed: false };
  } catch (error) {
    return refused(error);
  }
}

function refused(error: unknown): Answer {
  if (!(error instanceof ApiError)) throw error;
  // Copied, for the intent inside may change before a replay.
  return { status: error.status, body: { error: structuredClone(error.body) }, replayed: false };
}

function paramsOf(req: Request): Params {
  const params: unknown = req.method === 'POST' ? req.body : req.query;
  return isParams(params) ? params : {};
}

/** Any test key opens the one account there is; a live key must never be sent here. */
function assertTestKey(req: Request): void {
  const header = req.get('authorization') ?? '';
  const basic = /^Basic (.+)$/i.exec(header)?.[1];
  const key = basic === undefined ? /^Bearer (.+)$/i.exec(header)?.[1] : Buffer.from(basic, 'base64').toString().split(':')[0];
  if (key !== undefined && /^[sr]k_test_[\w-]+$/.test(key)) return;
  const message = key === undefined || key === '' ? 'You did not provide an API key.' : 'Invalid API Key provided: only test keys are taken here.';
  throw new ApiError(401, { type: 'invalid_request_error', message });
}

function send(req: Request, res: Response, answer: Answer, requestId: string): void {
  const key = req.get('idempotency-key');
  res.set('Request-Id', requestId);
  res.set('Stripe-Version', req.get('stripe-version') ?? fakeApiVersion);
  if (key !== undefined && req.method === 'POST') res.set('Idempotency-Key', key);
  if (answer.replayed) res.set('Idempotent-Replayed', 'true');
  res.status(answer.status).json(answer.body);
}
