import type { DepositRule } from '@shared/api/school';
import { demoPeople, type DemoPerson } from './demoPeople';

export interface DemoSchool {
  readonly name: string;
  readonly timeZone: string;
  readonly currency: string;
  readonly closingTime: string;
  readonly loanDays: number;
  readonly depositRule: DepositRule;
  readonly terms: string;
  readonly people: readonly DemoPerson[];
}

/** Students accept these words with every loan; they say all that may happen to the deposit. */
const terms = `Borrowing a practice set

1. You borrow this set to practise on. Bring it back complete, in its own jars, by the due time shown on your loan. You may ask for more time before it runs out.

2. The deposit. When you take the set out you pay the deposit shown. For a short loan it is held on your card and not taken; for a longer one it is charged and paid back. Your loan says which before you pay.

3. A hold on a card lapses by itself after some days. If the check of your set is still open shortly before that, the school secures the whole deposit first by taking it. That decides nothing: whatever is not kept is paid back to you.

4. When the set is back, an instructor takes a few readings of each stone and compares them with its record. If every stone is the recorded one, the whole deposit is released.

5. What may be kept. If a stone is missing or damaged, or two instructors reading separately both find that it is another stone than the recorded one, an admin of the school may keep part or all of the deposit, up to the value of what is gone, with each amount and its reason listed. No machine decides this, and nobody decides it alone or on one reading. You see the findings before anything is kept. The finding is about a stone and says nothing about you.

6. If you do not agree, you may object in the app for 14 days after the decision. Another person than the one who decided answers you.

7. Care. Contact liquid is toxic and marks soft stones: use it only in the lab and under its rules. Never look into an ultraviolet lamp. Some stones cleave when dropped or warmed: do not use heat, acid or an ultrasonic bath. Ask an instructor when you are not sure.`;

export const portEllery: DemoSchool = {
  name: 'Port Ellery School of Gemmology',
  timeZone: 'Europe/Dublin',
  currency: 'EUR',
  closingTime: '17:00',
  loanDays: 3,
  depositRule: { kind: 'share', percent: 30, minimumMinor: 2_000, maximumMinor: 12_000 },
  terms,
  people: demoPeople.portEllery,
};

/** A second, small school, so that one can see that schools do not see each other. */
export const saltpan: DemoSchool = {
  name: 'Saltpan Gem Workshop',
  timeZone: 'Europe/Lisbon',
  currency: 'EUR',
  closingTime: '18:00',
  loanDays: 7,
  depositRule: { kind: 'fixed', amountMinor: 3_000 },
  terms,
  people: demoPeople.saltpan,
};
