import express from 'express';
import type { Express, NextFunction, Request, Response } from 'express';

import type { FakeControl } from './control/control';
import { controlRoutes } from './control/control.routes';
import { ApiError } from './errors';
import type { Operation } from './http/operation';
import { serve } from './http/serve';
import type { Desk } from './http/serve';
import { pageRoutes } from './page/page.routes';
import { accountOperations } from './routes/account';
import { chargeOperations } from './routes/charges';
import { intentOperations } from './routes/intents';
import { peopleOperations } from './routes/people';
import { sessionOperations } from './routes/sessions';

const operations: readonly Operation[] = [
  ...sessionOperations,
  ...intentOperations,
  ...chargeOperations,
  ...peopleOperations,
  ...accountOperations,
];

/** The whole of the fake over HTTP: `/v1` for the SDK, `/pay` for students, `/_control` for tests, `/health`. */
export function createFakeApp(desk: Desk, control: FakeControl): Express {
  const app = express();
  app.disable('x-powered-by');
  app.set('query parser', 'extended');
  app.get('/health', (_req, res) => void res.json({ status: 'ok' }));
  app.use('/_control', controlRoutes(control));
  app.use(express.urlencoded({ extended: true, limit: '1mb' }));
  for (const operation of operations) app[operation.method](`/v1${operation.path}`, serve(desk, operation));
  app.use('/v1', (req: Request) => {
    throw new ApiError(404, { type: 'invalid_request_error', message: `Unrecognized request URL (${req.method}: ${req.baseUrl}${req.path}).` });
  });
  app.use(pageRoutes(desk));
  app.use(answerError);
  return app;
}

// Express knows an error handler by its four parameters.
function answerError(error: unknown, _req: Request, res: Response, _next: NextFunction): void {
  if (error instanceof ApiError) {
    res.status(error.status).json({ error: error.body });
    return;
  }
  const status = error instanceof Error && 'status' in error && typeof error.status === 'number' ? error.status : 500;
  if (status >= 500) process.stderr.write(`payment fake: ${error instanceof Error ? (error.stack ?? error.message) : String(error)}\n`);
  res.status(status).json({ error: { type: status >= 500 ? 'api_error' : 'invalid_request_error', message: 'The request could not be handled.' } });
}
