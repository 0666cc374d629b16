import { checkTransition, isOpen, loanTransitions } from '@shared/lending';
import type { LoanState } from '@shared/api/loans';
import { cannotMove } from '@/server/features/loans/loans.errors';

const states = Object.keys(loanTransitions) as LoanState[];

it('leads from every state to an end', () => {
  const reach = (from: LoanState): boolean => !isOpen(from) || loanTransitions[from].some(reach);
  expect(states.filter((state) => !reach(state))).toEqual([]);
  expect(states.filter((state) => !isOpen(state))).toEqual(['settled', 'cancelled']);
});

it('allows what the table lists and nothing else, and the refusal says what would be allowed', () => {
  for (const from of states) {
    for (const to of states) {
      const listed = (loanTransitions[from] as readonly LoanState[]).includes(to);
      expect({ from, to, ok: checkTransition(from, to).ok }).toEqual({ from, to, ok: listed });
    }
  }
  expect(checkTransition('out', 'cancelled')).toEqual({ ok: false, from: 'out', to: 'cancelled', allowed: ['returned'] });
});

it('refuses in words that end with the next step, from every state', () => {
  for (const from of states) {
    const { status, message: detail } = cannotMove({ from, to: 'out', allowed: loanTransitions[from] });
    expect(status).toBe(409);
    expect(detail).toMatch(isOpen(from) ? /What can be done now: .+\.$/ : /look at its page for what happened\.$/);
  }
});
