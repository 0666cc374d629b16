import type { MailData } from '../mailData';
import type { SchoolLetterContext } from './context';
import { type Letter, facts, paragraph } from './letter';
import { links } from './links';
import { sayAmount, sayJars, sayKit } from './words';

export function kitSetAside(data: MailData['kit-set-aside'], { publicUrl, school }: SchoolLetterContext): Letter {
  const jars = data.slots.length > 0 ? sayJars(data.slots) : 'the kit';
  return {
    subject: `Kit ${data.kit.kitNumber} needs a second look`,
    heading: `Kit ${data.kit.kitNumber} needs a second look`,
    blocks: [
      facts([
        ['Kit', sayKit(data.kit)],
        ['Open question', jars],
        ...(data.deposit ? [['Deposit', `${sayAmount(data.deposit)}, not decided`] as const] : []),
      ]),
      paragraph(`The bench check did not settle ${jars}. That is a statement about stones and readings: instruments slip, jars change places and readings are taken again every week.`),
      paragraph('Where readings are in question, a second person now takes their own. Nothing is kept from your deposit on one reading, and we write again as soon as people have decided.'),
      paragraph('If something about the kit struck you while you had it, tell the desk: it helps.'),
    ],
    action: { label: 'See your loan', url: links(publicUrl).loan(data.loanId) },
    sender: school.name,
  };
}

export function secondReadingWanted(data: MailData['second-reading-wanted'], { publicUrl, school }: SchoolLetterContext): Letter {
  return {
    subject: `Kit ${data.kit.kitNumber} is set aside: a second person is wanted`,
    heading: `A second person is wanted for kit ${data.kit.kitNumber}`,
    blocks: [
      facts([['Kit', `Kit ${data.kit.kitNumber}`], ['Open', sayJars(data.slots)]]),
      paragraph('A stone that can be read wants the own readings of somebody who has not read it in this check; the record and the first readings stay closed until theirs are in. A missing or damaged stone wants an admin’s word, with a reason and a photo.'),
      paragraph('If you read these stones first, or borrowed this kit, leave it to a colleague.'),
    ],
    action: { label: 'Open the bench', url: links(publicUrl).bench(data.loanId) },
    sender: school.name,
  };
}

export function depositReleased(data: MailData['deposit-released'], { publicUrl, school }: SchoolLetterContext): Letter {
  const { deposit } = data;
  const money = deposit === null ? 'There was no deposit, so there is nothing left to do.'
    : deposit.mode === 'hold' ? `The hold of ${sayAmount(deposit)} is released. Your bank may show it for a few days.`
      : `${sayAmount(deposit)} is on its way back to your card. Banks take up to ten days to show it.`;
  return {
    subject: `Kit ${data.kit.kitNumber}: every stone is back`,
    heading: `Every stone of kit ${data.kit.kitNumber} is back`,
    blocks: [
      facts([['Kit', sayKit(data.kit)], ['Bench check', 'every stone is the recorded one'], ...(deposit ? [['Deposit released', sayAmount(deposit)] as const] : [])]),
      paragraph(money),
      paragraph('Thank you for looking after the stones.'),
    ],
    action: { label: 'See your loan', url: links(publicUrl).loan(data.loanId) },
    sender: school.name,
  };
}
