import 'reflect-metadata';
import cookieParser from 'cookie-parser';
import express, { type Express } from 'express';
import { createAccessTokens } from './http/accessTokens';
import { apiPage } from './http/apiPage';
import { errorsMiddleware } from './http/errors.middleware';
import { requestLog } from './http/logging';
import { openApi } from './http/openapi';
import { NotFound } from './http/problem';
import { requestId } from './http/requestId';
import type { AnyRoute } from './http/route';
import { apiRouter } from './http/router';
import { allRoutes } from './http/routes';
import { publicLimit, securityHeaders } from './http/security';
import type { Dependencies, Services } from './http/services';
import { webApp } from './http/web';

/** Builds the app from its dependencies; it listens to nothing by itself, so that tests mount it without a port. */
export function createApp(deps: Dependencies, routes: readonly AnyRoute[] = allRoutes): Express {
  const { config } = deps;
  const app = express();
  app.disable('x-powered-by');
  app.set('etag', false); // API answers are never cached, and files bring their own
  app.set('trust proxy', config.trustProxy);

  app.use(requestId, requestLog(deps.logger), ...securityHeaders(config));
  app.use('/api/v1', cookieParser(), apiRouter(routes, deps, servicesOf(deps), publicLimit(config)));
  app.use('/api', documents(routes, config.publicUrl));
  if (config.webDir !== undefined) app.use(webApp(config.webDir));
  app.use(() => {
    throw new NotFound();
  });
  app.use(errorsMiddleware(deps.logger));
  return app;
}

function documents(routes: readonly AnyRoute[], publicUrl: string): express.Router {
  const router = express.Router();
  const document = openApi(routes, publicUrl);
  const page = apiPage(routes);
  router.get('/openapi.json', (_request, response) => {
    response.json(document);
  });
  router.get('/', (_request, response) => {
    response.type('html').send(page);
  });
  router.use(() => {
    throw new NotFound();
  });
  return router;
}

function servicesOf({ config, payments, storage, logger }: Dependencies): Services {
  return { config, payments, storage, logger, accessTokens: createAccessTokens(config.accessTokenSecret) };
}
