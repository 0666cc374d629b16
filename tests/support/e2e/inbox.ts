import { setTimeout as pause } from 'node:timers/promises';
import type { InboxMessage } from '@/server/mail/inbox/store';
import type { Stack } from './stack';

/** What the stack's mail inbox has taken so far, newest first; only mail to this address where one is given. */
export async function readInbox(stack: Pick<Stack, 'inboxUrl'>, to?: string): Promise<InboxMessage[]> {
  const query = to ? `?to=${encodeURIComponent(to)}` : '';
  const answer = await fetch(`${stack.inboxUrl}/messages.json${query}`);
  if (!answer.ok) throw new Error(`The inbox answered ${answer.status}.`);
  return (await answer.json()) as InboxMessage[];
}

/** Waits until mail whose subject matches has come to this address. Mail leaves by a job after commit, so it takes a moment. */
export async function waitForMail(
  stack: Pick<Stack, 'inboxUrl'>,
  { to, subject, timeoutMs = 15_000 }: { to: string; subject: RegExp; timeoutMs?: number },
): Promise<InboxMessage> {
  const deadline = Date.now() + timeoutMs;
  for (;;) {
    const messages = await readInbox(stack, to);
    const found = messages.find((message) => subject.test(message.subject));
    if (found) return found;
    if (Date.now() > deadline) {
      throw new Error(`No mail ${String(subject)} to ${to} after ${timeoutMs} ms; there is: ${messages.map((one) => one.subject).join(' | ') || 'nothing'}`);
    }
    await pause(100);
  }
}
