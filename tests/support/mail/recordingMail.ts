import type { MailPort, OutgoingMail } from '@/server/mail/mail.port';

/** A mail service that keeps what it is given. `answer` may throw, to play an outage or a refusal. */
export class RecordingMail implements MailPort {
  readonly sent: OutgoingMail[] = [];
  answer: (mail: OutgoingMail, attempts: number) => void = () => undefined;
  attempts = 0;

  async send(mail: OutgoingMail): Promise<void> {
    this.attempts += 1;
    this.answer(mail, this.attempts);
    this.sent.push(mail);
  }

  async close(): Promise<void> {
    // Nothing is open.
  }
}
