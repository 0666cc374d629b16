import type { EventEmitter } from 'node:events';
import { createServer } from 'node:http';
import type { Server } from 'node:net';
import { smtpSink } from './smtp';
import { type InboxMessage, openStore } from './store';
import { inboxWeb } from './web';

export interface InboxOptions {
  /** Ports on loopback; 0 takes a free one. */
  readonly smtpPort: number;
  readonly httpPort: number;
  /** Where mails are kept over a restart; in memory alone when left out. */
  readonly dir?: string;
  /** How many mails are kept, the newest ones. */
  readonly limit?: number;
}

export interface Inbox {
  readonly smtpPort: number;
  readonly httpPort: number;
  /** Newest first. */
  messages(): readonly InboxMessage[];
  close(): Promise<void>;
}

const loopback = '127.0.0.1';

/** Starts the local inbox: an SMTP server that takes every mail and a page that shows them. For the demo and tests, never for production. */
export async function createInbox(options: InboxOptions): Promise<Inbox> {
  const store = await openStore({ dir: options.dir, limit: options.limit ?? 500 });
  const smtp = smtpSink(store);
  const web = createServer(inboxWeb(store));
  const smtpPort = await listening(options.smtpPort, (port, done) => smtp.listen(port, loopback, done), smtp.server, smtp);
  smtp.on('error', () => undefined); // a client that breaks off in the middle is its own affair
  const httpPort = await listening(options.httpPort, (port, done) => web.listen(port, loopback, done), web);
  return {
    smtpPort,
    httpPort,
    messages: () => store.all(),
    async close() {
      await new Promise<void>((resolve) => { smtp.close(() => resolve()); });
      await new Promise<void>((resolve) => { web.close(() => resolve()); web.closeAllConnections(); });
    },
  };
}

/** @param hears whoever emits the error: the SMTP server passes on its inner server's */
async function listening(port: number, listen: (port: number, done: () => void) => unknown, server: Server, hears: EventEmitter = server): Promise<number> {
  await new Promise<void>((resolve, reject) => {
    hears.once('error', reject);
    listen(port, () => { hears.off('error', reject); resolve(); });
  });
  const address = server.address();
  return typeof address === 'object' && address !== null ? address.port : port;
}
