import { refused, type Refused } from '@/server/http/problem';
import type { LoanState } from '@shared/api/loans';

/** Where a loan stands, as the end of "This loan …". */
export const stateWords: Record<LoanState, string> = {
  reserved: 'is still waiting for its jars, terms or deposit',
  out: 'is out with its borrower',
  returned: 'is in the return box',
  checking: 'is at the bench',
  set_aside: 'is set aside until people have decided',
  settled: 'is settled',
  cancelled: 'was cancelled',
};

const steps: Record<LoanState, string> = {
  reserved: 'reserve it',
  out: 'take it out',
  returned: 'bring it back',
  checking: 'begin the bench check',
  set_aside: 'set it aside',
  settled: 'settle it',
  cancelled: 'cancel it',
};

/** 409 for a transition that the table does not list. */
export function cannotMove(refusal: { from: LoanState; to: LoanState; allowed: readonly LoanState[] }): Refused {
  const next = refusal.allowed.map((state) => steps[state]);
  const possible = next.length === 0 ? 'Nothing more can be done with it; look at its page for what happened.' : `What can be done now: ${next.join(', or ')}.`;
  return refused('loan_state', `This loan ${stateWords[refusal.from]}. ${possible}`);
}
