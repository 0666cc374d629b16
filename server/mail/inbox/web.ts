import express, { type Express, type RequestHandler } from 'express';
import { frameDocument, listPage, messagePage, notFoundPage } from './pages';
import type { InboxMessage, InboxStore } from './store';

const fonts: Readonly<Record<string, string>> = {
  'text.ttf': require.resolve('@expo-google-fonts/atkinson-hyperlegible-next/400Regular/AtkinsonHyperlegibleNext_400Regular.ttf'),
  'text-strong.ttf': require.resolve('@expo-google-fonts/atkinson-hyperlegible-next/700Bold/AtkinsonHyperlegibleNext_700Bold.ttf'),
  'heading.ttf': require.resolve('@expo-google-fonts/bricolage-grotesque/600SemiBold/BricolageGrotesque_600SemiBold.ttf'),
};

/**
 * The inbox page: `/` and `/messages/:id` for people, `/messages.json?to=address` (newest first) and
 * `DELETE /messages.json` for tests. Pages are plain HTML without a script.
 */
export function inboxWeb(store: InboxStore): Express {
  const app = express();
  app.disable('x-powered-by');
  app.use(localOnly, headers("default-src 'none'; style-src 'unsafe-inline'; font-src 'self'; frame-src 'self'; base-uri 'none'; form-action 'none'; frame-ancestors 'none'"));
  const find = (id: unknown): InboxMessage | undefined => store.all().find((message) => message.id === id);

  app.get('/', (_request, response) => {
    response.send(listPage(store.all()));
  });
  app.get('/messages.json', ({ query }, response) => {
    const to = typeof query['to'] === 'string' ? query['to'].toLowerCase() : undefined;
    response.json(store.all().filter((message) => to === undefined || message.to.some((address) => address.toLowerCase() === to)));
  });
  app.delete('/messages.json', async (_request, response) => {
    await store.clear();
    response.status(204).end();
  });
  app.get('/messages/:id', ({ params }, response) => {
    const message = find(params.id);
    if (message) response.send(messagePage(message, store.all()));
    else response.status(404).send(notFoundPage());
  });
  // The mail itself is somebody else's HTML: no script, no request of any kind, no origin; only its links may open a tab.
  const framed = headers("sandbox allow-popups allow-popups-to-escape-sandbox; default-src 'none'; style-src 'unsafe-inline'; base-uri 'self'; frame-ancestors 'self'");
  app.get('/messages/:id/html', framed, ({ params }, response) => {
    const message = find(params['id']);
    if (message) response.send(frameDocument(message));
    else response.status(404).send(notFoundPage());
  });
  app.get('/fonts/:name', ({ params }, response) => {
    const file = Object.hasOwn(fonts, params.name) ? fonts[params.name] : undefined;
    if (file) response.sendFile(file, { maxAge: '1d', dotfiles: 'allow' });
    else response.status(404).end();
  });
  app.use((_request, response) => {
    response.status(404).send(notFoundPage());
  });
  return app;
}

/** A page elsewhere could point its own name at this machine to read the mail: only this machine's own names are answered. */
const localOnly: RequestHandler = (request, response, next) => {
  if (/^(localhost|127\.0\.0\.1|\[::1\])(:\d+)?$/.test(request.headers.host ?? '')) next();
  else response.status(421).type('text').send('This inbox answers on localhost only.');
};

function headers(policy: string): RequestHandler {
  return (_request, response, next) => {
    response.set({ 'content-security-policy': policy, 'x-content-type-options': 'nosniff', 'referrer-policy': 'no-referrer', 'cache-control': 'no-store' });
    next();
  };
}
