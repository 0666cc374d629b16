import { type ParsedMail, simpleParser } from 'mailparser';
import { SMTPServer, type SMTPServerDataStream, type SMTPServerSession } from 'smtp-server';
import type { InboxStore } from './store';

const MAX_BYTES = 5 * 1024 * 1024;

/** An SMTP server that takes everything addressed to anyone and puts it into the store. Nothing leaves the machine. */
export function smtpSink(store: InboxStore): SMTPServer {
  return new SMTPServer({
    authOptional: true,
    disabledCommands: ['AUTH', 'STARTTLS'],
    size: MAX_BYTES,
    maxClients: 20,
    banner: 'local inbox',
    onData(stream, session, done) {
      keep(store, stream, session).then(() => done(), (error: unknown) => done(error instanceof Error ? error : new Error('not taken')));
    },
  });
}

async function keep(store: InboxStore, stream: SMTPServerDataStream, session: SMTPServerSession): Promise<void> {
  const parsed: ParsedMail = await simpleParser(stream, { skipImageLinks: true, skipTextToHtml: true });
  if (stream.sizeExceeded) throw Object.assign(new Error('the message is too large'), { responseCode: 552 });
  await store.add({
    receivedAt: new Date().toISOString(),
    messageId: parsed.messageId ?? '',
    from: parsed.from?.text ?? '',
    to: session.envelope.rcptTo.map(({ address }) => address),
    subject: parsed.subject ?? '',
    text: parsed.text ?? '',
    html: parsed.html === false ? '' : (parsed.html ?? ''),
  });
}
