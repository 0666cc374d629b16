/** One message, ready to go. */
export interface OutgoingMail {
  /** Stable over retries, so that a receiving server or person can tell a repeat from a second message. */
  readonly messageId: string;
  readonly to: string;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
}

/** Sends mail. Throws `MailRefused` when the address or message will never be taken, any other error when it may be later. */
export interface MailPort {
  send(mail: OutgoingMail): Promise<void>;
  close(): Promise<void>;
}

/** A permanent refusal (SMTP 5xx). Its message carries the reply code only: replies repeat the address. */
export class MailRefused extends Error {
  override readonly name = 'MailRefused';
}

/** Not sent for now: no connection, a timeout, a temporary refusal (SMTP 4xx). Worth another try. */
export class MailUnavailable extends Error {
  override readonly name = 'MailUnavailable';
}
