import type { LoanView } from '@shared/api/loans';
import type { BadgeState } from '@/components/ui';
import { formatDay } from '@/components/ui';

interface Clock { timeZone: string; now: Date }

/** The heading of a loan: its state, in the borrower's words. */
export function loanTitle(loan: LoanView, clock: Clock): string {
  const kit = `Kit ${loan.kitNumber}`;
  switch (loan.state) {
    case 'reserved': return loan.jars.every((jar) => jar.outSeenAt !== null) ? `${kit} is almost yours` : `Take out ${kit}`;
    case 'out': return loan.overdue ? `${kit} was due ${formatDay(loan.dueAt, clock)}` : `${kit} is yours until ${formatDay(loan.dueAt, clock)}`;
    case 'returned': return `${kit} is in the return box`;
    case 'checking': return `${kit} is being checked`;
    case 'set_aside': return `${kit} needs a second look`;
    case 'settled': return loan.outcome !== null && loan.outcome.keptMinor > 0 ? `${kit} is settled` : `${kit} is back, all is well`;
    case 'cancelled': return `${kit} was not taken out`;
  }
}

/** What follows, in a sentence. */
export function loanLead(loan: LoanView): string {
  switch (loan.state) {
    case 'reserved': return 'It is kept for you while you scan its jars, accept the terms and pay the deposit.';
    case 'out': return loan.overdue ? 'Bring it back as soon as you can. If something stands in the way, tell the desk.' : 'Bring it back with every stone in its own jar.';
    case 'returned': return 'An instructor takes readings of each stone before anything about the deposit is decided.';
    case 'checking': return 'An instructor is taking readings. You get an e-mail when every stone has its end.';
    case 'set_aside': return 'The readings left a question about a stone. A second person reads it before anybody decides; it is a question about stones, not about you.';
    case 'settled': return loan.outcome !== null && loan.outcome.keptMinor > 0 ? 'Below is what was kept and why, and how to object.' : 'Every stone is the recorded one. Thank you.';
    case 'cancelled': return cancelWords[loan.cancelReason ?? 'by_student'];
  }
}

const cancelWords = {
  by_student: 'You gave the reservation back. Nothing is held or charged.',
  by_staff: 'The desk cancelled the reservation. Nothing is held or charged.',
  abandoned: 'The deposit was not paid in time, so the kit went back to the shelf. Nothing is held or charged; start again if you still want it.',
  jar_absent: 'A jar was not in the kit, so it stays here until an admin has looked. Nothing is held or charged. Thank you for saying so.',
} as const;

export function loanBadge(loan: Pick<LoanView, 'state' | 'overdue'>): { state: BadgeState; label: string } {
  switch (loan.state) {
    case 'reserved': return { state: 'open', label: 'taking out' };
    case 'out': return loan.overdue ? { state: 'different', label: 'overdue' } : { state: 'out', label: 'out' };
    case 'returned': return { state: 'open', label: 'in the return box' };
    case 'checking': return { state: 'open', label: 'being checked' };
    case 'set_aside': return { state: 'open', label: 'second look' };
    case 'settled': return { state: 'same', label: 'settled' };
    case 'cancelled': return { state: 'neutral', label: 'cancelled' };
  }
}

/** Days from now to due, for "5 days left". */
export function daysLeft(dueAt: string, now: Date): string {
  const hours = (Date.parse(dueAt) - now.getTime()) / 3_600_000;
  if (hours < 0) return 'overdue';
  if (hours < 24) return hours < 1 ? 'less than an hour left' : `${Math.floor(hours)} hours left`;
  const days = Math.floor(hours / 24);
  return days === 1 ? '1 day left' : `${days} days left`;
}
