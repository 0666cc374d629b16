import type { Request, RequestHandler, Response } from 'express';
import type { EntityManager } from 'typeorm';
import type { Database } from '@/server/database/data-source';
import { withAccount, withSchool, withSystem } from '@/server/database/school';
import { uploadedFiles } from './bodies';
import { claimKey, hashRequest, readKey, storeAnswer } from './idempotency';
import { readParams } from './pathParams';
import { refused } from './problem';
import { FileReply, Reply, reply } from './reply';
import { requestIdOf } from './requestId';
import { operationOf, type AccountActor, type AnyRoute, type Context, type IdempotentCall, type SchoolActor } from './route';
import { send } from './send';
import type { Dependencies, Services } from './services';
import { refuseUnstorable, validated } from './validation';

type AnyActor = SchoolActor | AccountActor | null;
type AnyContext = Context<never, string, never, never>;

/** The last step of a route: validates what was sent, runs the handler in its transaction, sends what it returned. */
export function handler(declared: AnyRoute, deps: Dependencies, services: Services): RequestHandler {
  return async (request, response) => {
    const context = await readContext(declared, deps, services, request, response);
    const call = declared.idempotent ? idempotentCall(declared, request, context) : undefined;
    const answer = await run(declared, deps, context, call, request);
    await send(response, declared, answer);
  };
}

async function readContext(declared: AnyRoute, deps: Dependencies, services: Services, request: Request, response: Response): Promise<AnyContext> {
  const query: unknown = { ...request.query };
  refuseUnstorable(query);
  const context: Context<never, string, unknown, unknown> = {
    params: readParams(declared, request.params),
    query: declared.query ? await validated(declared.query, query) : {},
    body: declared.request ? await validated(declared.request, bodyOf(request)) : {},
    actor: actorOf(response) as never,
    now: deps.clock(),
    services,
    requestId: requestIdOf(response),
    header: (name) => request.get(name),
    cookies: cookiesOf(request),
    address: request.ip ?? '',
  };
  return context as AnyContext;
}

/** A body left out entirely is an empty object, so that its required fields are named rather than the body. */
function bodyOf(request: Request): unknown {
  const body: unknown = request.body ?? {};
  // multer's form has no prototype, which class-transformer cannot read.
  return typeof body === 'object' && !Array.isArray(body) ? { ...body } : body;
}

function actorOf(response: Response): AnyActor {
  const actor: unknown = response.locals['actor'];
  return (actor as AnyActor | undefined) ?? null;
}

function cookiesOf(request: Request): Record<string, string> {
  const cookies: unknown = request.cookies;
  if (typeof cookies !== 'object' || cookies === null) return {};
  return Object.fromEntries(Object.entries(cookies).filter((entry): entry is [string, string] => typeof entry[1] === 'string'));
}

function idempotentCall(declared: AnyRoute, request: Request, context: AnyContext): IdempotentCall {
  const actor = context.actor as SchoolActor;
  const files = uploadedFiles(request).map((file) => file.bytes);
  const { params, query, body } = context;
  return {
    accountId: actor.accountId,
    operation: operationOf(declared),
    key: readKey(request.get('idempotency-key')),
    requestHash: hashRequest({ schoolId: actor.schoolId, params, query, body, files }),
  };
}

async function run(declared: AnyRoute, deps: Dependencies, context: AnyContext, call: IdempotentCall | undefined, request: Request): Promise<unknown> {
  if (declared.run.transaction === 'none') {
    const rawBody = Buffer.isBuffer(request.body) ? request.body : Buffer.alloc(0);
    return declared.run.handle({ ...context, db: deps.db, files: uploadedFiles(request), rawBody, idempotency: call });
  }
  const { handle } = declared.run;
  const committed: (() => void | Promise<void>)[] = [];
  const answer = await inUnitOfWork(deps.db, context.actor, (tx) => {
    committed.length = 0; // an earlier try of this transaction was rolled back
    const work = (): Promise<unknown> => handle({ ...context, tx, afterCommit: (then) => committed.push(then) });
    return call ? once(tx, call, declared.status, work) : work();
  });
  for (const then of committed) await then();
  return answer;
}

function inUnitOfWork<T>(db: Database, actor: AnyActor, work: (tx: EntityManager) => Promise<T>): Promise<T> {
  if (actor === null) return withSystem(db, work);
  if ('schoolId' in actor) return withSchool(db, actor, work);
  return withAccount(db, actor.accountId, work);
}

/** Does the work under its key, or repeats the answer the key already has. */
async function once(tx: EntityManager, call: IdempotentCall, status: number, work: () => Promise<unknown>): Promise<unknown> {
  const before = await claimKey(tx, call);
  if (before === 'unfinished') throw refused('idempotency_key_busy', 'The same request is being worked on. Try again in a moment.');
  if (before) return reply(before.status, before.body, { headers: { 'Idempotency-Hit': 'true' } });
  const answer = await work();
  if (answer instanceof FileReply) throw new Error(`${call.operation}: a file cannot be kept for a replay`);
  const stored = answer instanceof Reply ? { status: answer.status, body: answer.body as unknown } : { status, body: answer };
  await storeAnswer(tx, call, stored);
  return answer;
}
