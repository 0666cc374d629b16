import type { KitPlace, KitStanding } from '@shared/api/kits';
import type { LoanState } from '@shared/api/loans';

/**
 * The life of a loan. A transition that is not listed cannot happen.
 * `reserved` keeps the kit for the student while jars are scanned and the deposit is paid.
 */
export const loanTransitions = {
  reserved: ['out', 'cancelled'],
  out: ['returned'],
  returned: ['checking'],
  checking: ['settled', 'set_aside'],
  set_aside: ['settled'],
  settled: [],
  cancelled: [],
} as const satisfies Record<LoanState, readonly LoanState[]>;

export type Transition = { ok: true } | { ok: false; from: LoanState; to: LoanState; allowed: readonly LoanState[] };

/** Whether a loan may go from one state to another; a refusal says what would be allowed. */
export function checkTransition(from: LoanState, to: LoanState): Transition {
  const allowed: readonly LoanState[] = loanTransitions[from];
  return allowed.includes(to) ? { ok: true } : { ok: false, from, to, allowed };
}

export function isOpen(state: LoanState): boolean {
  return loanTransitions[state].length > 0;
}

/** Where a kit is, from its standing, its open loan and whether its record can carry a verdict. */
export function kitPlace(kit: { standing: KitStanding; openLoanState: LoanState | null; gapCount: number }): KitPlace {
  if (kit.standing === 'retired') return 'retired';
  const { openLoanState } = kit;
  if (openLoanState !== null && openLoanState !== 'settled' && openLoanState !== 'cancelled') return openLoanState;
  if (kit.standing === 'set_aside') return 'set_aside';
  return kit.gapCount > 0 ? 'incomplete' : 'shelf';
}
