import type { Role } from '@shared/permissions';
import { DateTime } from 'luxon';
import type { MailData } from '../mailData';
import type { LetterContext, SchoolLetterContext } from './context';
import { type Letter, paragraph } from './letter';
import { links } from './links';
import { sayTime } from './words';

export function passwordReset(data: MailData['password-reset'], { publicUrl }: LetterContext): Letter {
  const until = DateTime.fromISO(data.expiresAt, { zone: 'utc' }).setLocale('en-GB').toFormat('d LLLL yyyy, HH:mm');
  return {
    subject: 'Choose a new password',
    heading: 'Choose a new password',
    blocks: [
      paragraph(`Somebody, most likely you, asked for a new password for this address. The link below works once, until ${until} UTC.`),
      paragraph('If it was not you, do nothing: your password stays as it is.'),
    ],
    action: { label: 'Choose a new password', url: links(publicUrl).reset(data.token) },
    sender: 'Trayward',
  };
}

export function invitation(data: MailData['invitation'], { publicUrl, school }: SchoolLetterContext): Letter {
  return {
    subject: `${school.name} invites you to borrow and check its kits`,
    heading: `You are invited to ${school.name}`,
    blocks: [
      paragraph(`${data.inviteeName ? `Hello ${data.inviteeName}. ` : ''}${data.inviterName} has added you as ${sayRoles(data.roles)}.`),
      paragraph(`${school.name} lends its reference stones with Trayward. Open the link to set your password; it works once, until ${sayTime(data.expiresAt, school.timeZone)}.`),
      paragraph('If you did not expect this, do nothing: no account is made.'),
    ],
    action: { label: 'Accept the invitation', url: links(publicUrl).invitation(data.token) },
    sender: school.name,
  };
}

const roleWords: Record<Role, string> = { student: 'a student', instructor: 'an instructor', admin: 'an admin' };

function sayRoles(roles: readonly Role[]): string {
  return roles.map((role) => roleWords[role]).join(' and ');
}
