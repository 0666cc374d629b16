import path from 'node:path';
import { createInbox } from './createInbox';

/** The demo's mail inbox as a process: `SMTP_PORT` takes the mail, `INBOX_PORT` shows it, `TRAYWARD_DATA` keeps it. */
async function main(): Promise<void> {
  const data = process.env['TRAYWARD_DATA']?.trim();
  const inbox = await createInbox({ smtpPort: port('SMTP_PORT'), httpPort: port('INBOX_PORT'), ...(data ? { dir: path.resolve(data, 'inbox') } : {}) });
  process.stdout.write(`Mail inbox on http://127.0.0.1:${inbox.httpPort}, taking mail on port ${inbox.smtpPort}\n`);
  for (const signal of ['SIGTERM', 'SIGINT'] as const) process.once(signal, () => { inbox.close().catch(fail); });
}

function port(name: string): number {
  const value = Number(process.env[name]);
  if (Number.isInteger(value) && value >= 1 && value <= 65_535) return value;
  throw new Error(`${name} must be a port number`);
}

function fail(error: unknown): void {
  process.stderr.write(`The mail inbox could not go on: ${error instanceof Error ? error.message : String(error)}\n`);
  process.exit(1);
}

main().catch(fail);
