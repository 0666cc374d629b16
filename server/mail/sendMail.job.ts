import { type JobHandler, PermanentFailure } from '@/server/jobs/deps';
import type { JobPayload } from '@/server/jobs/payloads';
import { MailRefused } from './mail.port';
import type { MailData } from './mailData';
import { markFailed, markSent, readQueuedMail, type QueuedMail } from './outbox';
import { type ComposedMail, composeAccountMail, composeSchoolMail, isAccountTemplate, isSchoolTemplate } from './templates/compose';

/**
 * Sends one mail of the outbox, at least once: killed between the sending and the mark, it sends again under the same
 * Message-ID. No transaction is open during the sending. What can never be delivered is recorded and not tried again.
 */
export const sendMail: JobHandler<JobPayload<'send-mail'>> = async (deps, key, attempt) => {
  const mail = await readQueuedMail(deps.db, key);
  if (mail === null) return;
  if (mail.to === null) return giveUp('the addressee has no account in this school');

  const composed = tryCompose(mail, deps.publicUrl);
  if (composed === null) {
    await giveUp(`the data does not fit the template ${mail.template}`);
    throw new PermanentFailure(`mail ${key.mailId}: the data does not fit the template ${mail.template}`);
  }
  try {
    await deps.mail.send({ messageId: `<${key.mailId}@${new URL(deps.publicUrl).hostname}>`, to: mail.to, ...composed });
  } catch (error) {
    if (error instanceof MailRefused) return giveUp(error.message);
    if (attempt.isLast) await giveUp(error instanceof Error ? error.message : 'no answer from the mail service');
    throw error;
  }
  await markSent(deps.db, key, deps.now());

  async function giveUp(failure: string): Promise<void> {
    await markFailed(deps.db, key, failure);
    deps.log.warn({ mailId: key.mailId, template: mail?.template, failure }, 'mail given up');
  }
};

function tryCompose(mail: QueuedMail, publicUrl: string): ComposedMail | null {
  const { template, data, school } = mail;
  const context = { publicUrl, ...(mail.recipientName === null ? {} : { recipientName: mail.recipientName }) };
  try {
    // The row was written by queueMail, which took the data in the template's own type; JSON keeps it.
    if (isSchoolTemplate(template) && school) return composeSchoolMail(template, data as MailData[typeof template], { ...context, school });
    if (isAccountTemplate(template)) return composeAccountMail(template, data as MailData[typeof template], context);
    return null;
  } catch {
    return null; // written by an older or newer version of the template
  }
}
