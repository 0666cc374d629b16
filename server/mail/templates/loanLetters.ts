import type { MailData } from '../mailData';
import type { SchoolLetterContext } from './context';
import { type Block, type Letter, facts, list, paragraph } from './letter';
import { links } from './links';
import { sayAmount, sayDay, sayJars, sayKit, sayTime } from './words';

export function loanStarted(data: MailData['loan-started'], { publicUrl, school }: SchoolLetterContext): Letter {
  const { deposit } = data;
  const money: Block[] = [];
  if (deposit?.mode === 'hold') money.push(paragraph('The deposit is held on your card, not taken. It is released when every stone is back and checked.'));
  if (deposit?.mode === 'charge') money.push(paragraph('This loan is longer than a card can be held, so the deposit was charged. It is paid back when every stone is back and checked.'));
  return {
    subject: `Kit ${data.kit.kitNumber} is yours until ${sayDay(data.dueAt, school.timeZone)}`,
    heading: `Kit ${data.kit.kitNumber} is yours until ${sayDay(data.dueAt, school.timeZone)}`,
    blocks: [
      facts([
        ['Kit', sayKit(data.kit)],
        ['Due', sayTime(data.dueAt, school.timeZone)],
        ...(deposit ? [[deposit.mode === 'hold' ? 'Deposit held' : 'Deposit charged', sayAmount(deposit)] as const] : []),
      ]),
      paragraph('You have these jars:'),
      list(data.stones.map((stone) => `${stone.slot}: ${stone.neutralDescription}`)),
      ...money,
      paragraph('Put each stone back into its own jar as soon as you have looked at it. To return the kit, scan it and its jars and leave it in the return box.'),
    ],
    action: { label: 'See your loan', url: links(publicUrl).loan(data.loanId) },
    sender: school.name,
  };
}

export function kitReturned(data: MailData['kit-returned'], { publicUrl, school }: SchoolLetterContext): Letter {
  const said: Block[] = [];
  if (data.missingSlots.length > 0) said.push(paragraph(`You said that ${sayJars(data.missingSlots)} ${data.missingSlots.length > 1 ? 'are' : 'is'} missing. If you find ${data.missingSlots.length > 1 ? 'them' : 'it'}, bring ${data.missingSlots.length > 1 ? 'them' : 'it'} to the desk.`));
  if (data.damagedSlots.length > 0) said.push(paragraph(`You said that ${sayJars(data.damagedSlots)} ${data.damagedSlots.length > 1 ? 'are' : 'is'} damaged. Thank you for saying so.`));
  return {
    subject: `Kit ${data.kit.kitNumber} is in the return box`,
    heading: `Kit ${data.kit.kitNumber} is in the return box`,
    blocks: [
      facts([['Kit', sayKit(data.kit)], ['Returned', sayTime(data.returnedAt, school.timeZone)]]),
      ...said,
      paragraph('An instructor will scan the kit and check each stone. We write again when that is done; until then your deposit stays as it is.'),
    ],
    action: { label: 'See your loan', url: links(publicUrl).loan(data.loanId) },
    sender: school.name,
  };
}

const cancelled: Record<MailData['loan-cancelled']['reason'], string> = {
  by_student: 'You cancelled the booking.',
  by_staff: 'The school cancelled the booking. Ask at the desk if you would like to know more, or book another kit.',
  abandoned: 'The deposit was not paid in time, so the kit is free for others again. You can book again whenever you like.',
  jar_absent: 'A jar was not in the kit, so it could not go out. The desk has been told. Please book another kit.',
};

export function loanCancelled(data: MailData['loan-cancelled'], { publicUrl, school }: SchoolLetterContext): Letter {
  const absent = data.absentSlots ?? [];
  return {
    subject: `Your booking of kit ${data.kit.kitNumber} is cancelled`,
    heading: `Your booking of kit ${data.kit.kitNumber} is cancelled`,
    blocks: [
      facts([['Kit', sayKit(data.kit)], ...(absent.length > 0 ? [['Not in the kit', sayJars(absent)] as const] : [])]),
      paragraph(cancelled[data.reason]),
      paragraph('Nothing is kept from your card. If a deposit was already held, it is released; your bank may show it for a few days.'),
    ],
    action: { label: 'See your loan', url: links(publicUrl).loan(data.loanId) },
    sender: school.name,
  };
}
