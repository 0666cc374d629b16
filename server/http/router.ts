import { Router, type RequestHandler } from 'express';
import { may } from '@shared/permissions';
import { authentication } from './authentication';
import { bodyParser } from './bodies';
import { currentSchool } from './currentSchool';
import { handler } from './handler';
import { readKey } from './idempotency';
import { readParams } from './pathParams';
import { forbidden, NotFound, Problem } from './problem';
import { operationOf, type AccountActor, type AnyRoute } from './route';
import type { Dependencies, Services } from './services';

interface Gates {
  readonly authenticate: RequestHandler;
  readonly publicLimit: RequestHandler;
}

/** The Express router of a route table. The order of a route's gates is the order in which a caller learns anything. */
export function apiRouter(routes: readonly AnyRoute[], deps: Dependencies, services: Services, publicLimit: RequestHandler): Router {
  const router = Router({ caseSensitive: true });
  const gates: Gates = { authenticate: authentication(services.accessTokens), publicLimit };
  refuseDoubles(routes);
  for (const declared of routes) {
    router[declared.method](declared.path, ...steps(declared, deps, services, gates));
  }
  for (const [path, methods] of methodsByPath(routes)) router.all(path, methodNotAllowed(methods));
  router.use(() => {
    throw new NotFound();
  });
  return router;
}

function steps(declared: AnyRoute, deps: Dependencies, services: Services, gates: Gates): RequestHandler[] {
  const named: RequestHandler = (_request, response, next) => {
    response.locals['operation'] = operationOf(declared);
    next();
  };
  const wellFormed: RequestHandler = (request, _response, next) => {
    readParams(declared, request.params);
    if (declared.idempotent) readKey(request.get('idempotency-key'));
    next();
  };
  return [named, ...admission(declared, deps, gates), wellFormed, ...bodyParser(declared), handler(declared, deps, services)];
}

function admission(declared: AnyRoute, { db }: Dependencies, gates: Gates): RequestHandler[] {
  const { permission } = declared;
  if (permission === 'public') return [gates.publicLimit];
  if (permission === 'signed-in') return [gates.authenticate];
  const permitted: RequestHandler = async (request, response, next) => {
    const { accountId } = response.locals['actor'] as AccountActor;
    const actor = await currentSchool(db, accountId, request.get('x-school'));
    if (!may(actor.roles, permission)) throw forbidden();
    response.locals['actor'] = actor;
    next();
  };
  return [gates.authenticate, permitted];
}

function methodsByPath(routes: readonly AnyRoute[]): Map<string, string[]> {
  const methods = new Map<string, string[]>();
  for (const { method, path } of routes) {
    methods.set(path, [...(methods.get(path) ?? []), method.toUpperCase()]);
  }
  return methods;
}

function methodNotAllowed(methods: readonly string[]): RequestHandler {
  const allowed = methods.join(', ');
  return () => {
    throw new Problem({
      status: 405, title: 'Method not allowed', code: 'method_not_allowed', detail: `This address takes ${allowed}.`, headers: { Allow: allowed },
    });
  };
}

/** Express would silently keep the first of two routes with one method and path. */
function refuseDoubles(routes: readonly AnyRoute[]): void {
  const seen = new Set<string>();
  for (const declared of routes) {
    const name = operationOf(declared).replaceAll(/:\w+/g, ':');
    if (seen.has(name)) throw new Error(`Two routes are declared as ${operationOf(declared)}`);
    seen.add(name);
  }
}
