import path from 'node:path';
import express, { Router } from 'express';
import { NotFound } from './problem';

/** Files whose names carry a hash of their bytes never change; everything else is asked for anew each time. */
const hashed = /[-.][0-9a-f]{16,}\.[a-z0-9]+$/i;

/**
 * Serves the exported web app. An address that is no file is a screen of the app, so it gets the app's one page, but a
 * missing file (an address with an extension) is 404: a page in place of a script would be an error hard to find.
 */
export function webApp(webDir: string): Router {
  const router = Router();
  router.use(
    express.static(webDir, {
      index: false,
      setHeaders: (response, file) => {
        response.setHeader('Cache-Control', hashed.test(path.basename(file)) ? 'public, max-age=31536000, immutable' : 'no-cache');
      },
    }),
  );
  router.get('/{*any}', (request, response, next) => {
    if (path.extname(request.path) !== '') {
      next(new NotFound());
      return;
    }
    response.set('Cache-Control', 'no-cache');
    response.sendFile('index.html', { root: webDir }, (error) => {
      if (error) next(error);
    });
  });
  return router;
}
