import type { MailData } from '../mailData';
import type { SchoolLetterContext } from './context';
import { type Letter, facts, paragraph } from './letter';
import { links } from './links';
import { sayJars, sayKit } from './words';

export function jarAbsent(data: MailData['jar-absent'], { publicUrl, school }: SchoolLetterContext): Letter {
  const jars = sayJars(data.slots);
  return {
    subject: `Kit ${data.kit.kitNumber} is set aside: ${jars} not there`,
    heading: `Kit ${data.kit.kitNumber} is set aside`,
    blocks: [
      facts([['Kit', sayKit(data.kit)], ['Not in the kit', jars]]),
      paragraph('It was noticed at take-out, so the kit did not go out and the booking is cancelled.'),
      paragraph('Look for the jar in the neighbouring kits and at the bench. Then lend the kit again from its page, or record the stone as missing.'),
    ],
    action: { label: 'See the loan', url: links(publicUrl).loan(data.loanId) },
    sender: school.name,
  };
}

/** Says that there is an objection, not what it says: what a person wrote stays in the app. */
export function objectionMade(data: MailData['objection-made'], { publicUrl, school }: SchoolLetterContext): Letter {
  return {
    subject: `An objection about kit ${data.kit.kitNumber} wants an answer`,
    heading: `An objection about kit ${data.kit.kitNumber} wants an answer`,
    blocks: [
      facts([['Kit', sayKit(data.kit)]]),
      paragraph('The borrower sees the settlement of this loan differently and has said why. Read it and answer on the loan’s page; it stays on the desk until somebody does.'),
    ],
    action: { label: 'Read and answer', url: links(publicUrl).loan(data.loanId) },
    sender: school.name,
  };
}
