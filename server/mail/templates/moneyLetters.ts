import type { KeptItem, MailData } from '../mailData';
import type { SchoolLetterContext } from './context';
import { type Block, type Letter, facts, list, paragraph } from './letter';
import { links } from './links';
import { sayAmount, sayKit, sayTime } from './words';

export function keepProposed(data: MailData['keep-proposed'], context: SchoolLetterContext): Letter {
  const { publicUrl, school } = context;
  return {
    subject: `Kit ${data.kit.kitNumber}: the school proposes to keep ${sayAmount(data.kept)} of your deposit`,
    heading: `The school proposes to keep ${sayAmount(data.kept)} of your deposit`,
    blocks: [
      facts([['Kit', sayKit(data.kit)], ['To be kept', sayAmount(data.kept)], ['To be released', sayAmount(data.released)]]),
      ...itemBlocks(data.items),
      paragraph('Nothing has moved yet. You can now see the readings behind this on your loan’s page.'),
      objection(data.objectBy, school.timeZone),
    ],
    action: { label: 'See the readings and answer', url: links(publicUrl).loan(data.loanId) },
    sender: school.name,
  };
}

export function depositSettled(data: MailData['deposit-settled'], context: SchoolLetterContext): Letter {
  const { publicUrl, school } = context;
  const nothingKept = data.kept.amountMinor === 0;
  const heading = nothingKept ? `Your deposit of ${sayAmount(data.released)} is released`
    : `${sayAmount(data.kept)} of your deposit is kept, ${sayAmount(data.released)} released`;
  return {
    subject: `Kit ${data.kit.kitNumber}: ${nothingKept ? 'your deposit is released' : 'your deposit is settled'}`,
    heading,
    blocks: [
      facts([['Kit', sayKit(data.kit)], ['Kept', sayAmount(data.kept)], ['Released', sayAmount(data.released)]]),
      ...itemBlocks(data.items),
      paragraph(nothingKept ? 'Every stone of the kit has its end, and the check is closed. Your bank may take a few days to show the release.'
        : 'People decided this, not a machine, and what it rests on is now open to you on your loan’s page. It is a finding about stones, not about you.'),
      ...(nothingKept ? [] : [objection(data.objectBy, school.timeZone)]),
    ],
    action: { label: nothingKept ? 'See your loan' : 'See the readings or object', url: links(publicUrl).loan(data.loanId) },
    sender: school.name,
  };
}

function itemBlocks(items: readonly KeptItem[]): Block[] {
  if (items.length === 0) return [];
  return [paragraph('What it is for:'), list(items.map(sayItem))];
}

function sayItem(item: KeptItem): string {
  const what = [item.slot ? `Jar ${item.slot}` : 'The kit', item.stone].filter(Boolean).join(', ');
  return `${what}: ${sayAmount(item)}. ${item.reason}`;
}

function objection(objectBy: string, timeZone: string): Block {
  return paragraph(`If you see it differently, say so on your loan’s page until ${sayTime(objectBy, timeZone)}. A person reads it and answers.`);
}

export function paymentTooLate(data: MailData['payment-too-late'], { publicUrl, school }: SchoolLetterContext): Letter {
  const amount = sayAmount(data.deposit);
  return {
    subject: `Kit ${data.kit.kitNumber}: your payment came after the booking had ended`,
    heading: 'Your payment came after the booking had ended',
    blocks: [
      facts([['Kit', sayKit(data.kit)], [data.deposit.mode === 'hold' ? 'Hold cancelled' : 'Paid back', amount]]),
      paragraph(data.deposit.mode === 'hold' ? `The hold of ${amount} was cancelled and nothing was taken. Your bank may show it for a few days.`
        : `${amount} is on its way back to your card. Banks take up to ten days to show it.`),
      paragraph('The kit did not go out to you: please leave it on the shelf, or scan it again to book it anew.'),
    ],
    action: { label: 'See your loan', url: links(publicUrl).loan(data.loanId) },
    sender: school.name,
  };
}

export function holdSecured(data: MailData['hold-secured'], { publicUrl, school }: SchoolLetterContext): Letter {
  const amount = sayAmount(data.deposit);
  return {
    subject: `Kit ${data.kit.kitNumber}: your deposit was charged so that the check can finish`,
    heading: 'Your deposit was charged so that the check can finish',
    blocks: [
      facts([['Kit', sayKit(data.kit)], ['Charged for now', amount]]),
      paragraph(`A card can be held for a few days only, and the check of your kit is still open. So the hold of ${amount} was turned into a charge, as the terms say.`),
      paragraph('Nothing has been kept: that is for people to decide. What is released is paid back to your card.'),
    ],
    action: { label: 'See your loan', url: links(publicUrl).loan(data.loanId) },
    sender: school.name,
  };
}
