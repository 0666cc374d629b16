import type { ErrorRequestHandler, Response } from 'express';
import type { Logger } from 'pino';
import { faultForLog } from './logging';
import { Problem } from './problem';
import { databaseFault, toProblem } from './problemMapper';
import { requestIdOf } from './requestId';

/** Writes `problem` as the answer. */
export function sendProblem(response: Response, problem: Problem): void {
  response.status(problem.status).set(problem.headers).set('Cache-Control', 'no-store');
  response.type('application/problem+json');
  response.send(
    JSON.stringify({
      type: `urn:trayward:problem:${problem.code}`,
      title: problem.title,
      status: problem.status,
      detail: problem.message,
      code: problem.code,
      errors: problem.errors,
      requestId: requestIdOf(response),
    }),
  );
}

/** The one place where a thrown error becomes an answer. A fault of ours is logged in full and told in one line. */
export function errorsMiddleware(logger: Logger): ErrorRequestHandler {
  return (error: unknown, _request, response, next) => {
    const problem = toProblem(error);
    const about = { requestId: requestIdOf(response) };
    if (!problem) logger.error({ ...about, fault: faultForLog(error) }, 'request failed');
    // Answered well enough, yet a rule that only the database noticed is usually one that a DTO or a service misses.
    else if (databaseFault(error)) logger.warn({ ...about, fault: faultForLog(error) }, 'refused by the database');

    if (response.headersSent) next(error); // too late for a document: Express closes the connection
    else sendProblem(response, problem ?? ourFault());
  };
}

function ourFault(): Problem {
  return new Problem({
    status: 500,
    title: 'Something went wrong on our side',
    code: 'internal',
    detail: 'Nothing was changed. Try again; if it happens again, tell the school and give the request id.',
  });
}
