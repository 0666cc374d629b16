import { once } from 'node:events';
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';

import { createFakeApp } from './app';
import { createBank, keep } from './bank';
import type { Bank } from './bank';
import { createControl } from './control/control';
import type { FakeControl } from './control/control';
import { createFaultBook } from './http/faults';
import type { Desk } from './http/serve';
import { endpointDocument } from './routes/account';
import { createStateFile, noStateFile } from './state.file';
import { letTimePass } from './time';
import { Courier } from './webhooks/courier';

export type { FakeControl } from './control/control';

export interface PaymentFakeOptions {
  /** Signs the notices; what the receiver knows as its webhook secret. */
  webhookSecret: string;
  /** Where notices go; nowhere when absent. */
  webhookUrl?: string;
  /** Keeps everything in this file over restarts; memory only when absent. */
  filePath?: string;
  /** How students reach the pages, when not directly at the port (a proxy, say). */
  publicUrl?: string;
  /** Pauses between tries of one notice, ms. */
  retryDelaysMs?: readonly number[];
  wallClockMs?: () => number;
}

export interface PaymentFakeAddress {
  host: string;
  port: number;
  protocol: 'http';
  url: string;
}

export interface PaymentFake {
  control: FakeControl;
  /** Listens on loopback; port 0 takes a free one. */
  start(port?: number, host?: string): Promise<PaymentFakeAddress>;
  stop(): Promise<void>;
}

const retryDelaysMs = [1000, 5000, 15_000, 60_000, 300_000, 900_000];
const tickMs = 1000;

/**
 * A small stateful stand-in for the payment service that the official SDK can be pointed at (`host`, `port`,
 * `protocol`). No money moves and no real card is taken. See the README beside this file.
 */
export function createPaymentFake(options: PaymentFakeOptions): PaymentFake {
  const wallClockMs = options.wallClockMs ?? Date.now;
  const file = options.filePath === undefined ? noStateFile : createStateFile(options.filePath);
  const bank = createBank({ state: file.read(), pageBase: withoutSlash(options.publicUrl ?? ''), wallClockMs });
  const desk: Desk = { bank, faults: createFaultBook(), save: () => file.write(bank.state) };
  const courier = new Courier({
    bank,
    secret: options.webhookSecret,
    wallClockMs,
    retryDelaysMs: options.retryDelaysMs ?? retryDelaysMs,
    save: desk.save,
    report,
  });
  if (options.webhookUrl !== undefined) configureEndpoint(bank, options.webhookUrl);
  const control = createControl({ desk, courier, secret: options.webhookSecret, wallClockMs });
  const server = createServer(createFakeApp(desk, control));
  let ticking: NodeJS.Timeout | undefined;

  return {
    control,
    async start(port = 0, host = '127.0.0.1') {
      server.listen(port, host);
      await once(server, 'listening');
      const address = addressOf(server.address(), host);
      if (bank.pageBase === '') bank.pageBase = address.url;
      courier.resume();
      ticking = setInterval(() => tick(desk), tickMs).unref();
      return address;
    },
    async stop() {
      clearInterval(ticking);
      courier.stop();
      if (server.listening) {
        const closed = once(server, 'close');
        server.close();
        server.closeAllConnections();
        await closed;
      }
      await desk.save();
    },
  };
}

/** Time goes by without requests too. */
function tick(desk: Desk): void {
  const before = Object.keys(desk.bank.state.documents.event).length;
  letTimePass(desk.bank);
  if (Object.keys(desk.bank.state.documents.event).length !== before) desk.save().catch(report);
}

function report(error: unknown): void {
  process.stderr.write(`payment fake: ${error instanceof Error ? error.message : String(error)}\n`);
}

/** The endpoint the environment names; its id stays the same, so that a changed address replaces the old one. */
function configureEndpoint(bank: Bank, url: string): void {
  const given = { url, enabledEvents: ['*'], description: 'Configured at start', apiVersion: null, metadata: {} };
  keep(bank, 'webhook_endpoint', endpointDocument(bank, 'we_configured', given));
}

function addressOf(address: AddressInfo | string | null, host: string): PaymentFakeAddress {
  if (address === null || typeof address === 'string') throw new Error('The payment fake has no port.');
  const shownHost = host.includes(':') ? `[${host}]` : host;
  return { host, port: address.port, protocol: 'http', url: `http://${shownHost}:${address.port}` };
}

function withoutSlash(url: string): string {
  return url.replace(/\/+$/, '');
}
