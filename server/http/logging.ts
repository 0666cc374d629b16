import type { ServerResponse } from 'node:http';
import type { RequestHandler } from 'express';
import pino, { type Logger } from 'pino';
import { pinoHttp } from 'pino-http';
import { databaseFault } from './problemMapper';

/** The process's own log: JSON lines on standard output. */
export function createLogger(level: string): Logger {
  return pino({ level, base: { pid: process.pid }, timestamp: pino.stdTimeFunctions.isoTime });
}

/**
 * One line a request: method, operation, status, time and request id. The operation is the route's pattern
 * (`POST /invitations/:token/acceptance`), never the address itself: addresses carry tokens and search words.
 */
export function requestLog(logger: Logger): RequestHandler {
  return pinoHttp({
    logger,
    genReqId: (_request, response) => String(localsOf(response)['requestId']),
    serializers: { req: () => undefined, res: () => undefined, err: () => undefined },
    customProps: (request, response) => ({
      requestId: localsOf(response)['requestId'],
      operation: localsOf(response)['operation'] ?? `${request.method} (web)`,
      status: response.statusCode,
    }),
    customLogLevel: (_request, response) => (response.statusCode >= 500 ? 'warn' : 'info'),
    customSuccessMessage: () => 'request',
    customErrorMessage: () => 'request',
  });
}

function localsOf(response: ServerResponse): Record<string, unknown> {
  if (!('locals' in response) || typeof response.locals !== 'object' || response.locals === null) return {};
  return { ...response.locals };
}

/**
 * An error made fit for the log. A database error's message and parameters may hold a person's data, so only its
 * SQLSTATE, the names involved and where in our code it came from are kept.
 */
export function faultForLog(error: unknown): Record<string, unknown> {
  if (!(error instanceof Error)) return { name: typeof error };
  const frames = (error.stack ?? '').split('\n').filter((line) => /^\s+at /.test(line)).slice(0, 12).join('\n');
  const fault = databaseFault(error);
  if (fault) return { name: error.name, ...fault, frames };
  return { name: error.name, message: error.message, frames };
}
