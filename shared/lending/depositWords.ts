import type { DepositView } from '@shared/api/loans';
import { formatMoney } from '@shared/money';

type Described = Pick<DepositView, 'amountMinor' | 'currency' | 'mode' | 'state' | 'keptMinor' | 'returnedMinor'> & {
  /** A hold that was charged whole so that it did not lapse. */
  readonly secured: boolean;
};

/** What happens, or has happened, to a deposit, in plain words for the borrower. Says nothing of stones. */
export function depositWords(deposit: Described): string {
  if (deposit.mode === 'none') return 'No deposit is due for this kit.';
  const money = (amountMinor: number): string => formatMoney(amountMinor, deposit.currency);
  const amount = money(deposit.amountMinor);
  switch (deposit.state) {
    case 'none':
    case 'opening':
    case 'open':
      return beforePaying(deposit.mode, amount);
    case 'held':
      return `${amount} is held on your card, not taken. The hold ends when the kit is back and checked.`;
    case 'charged':
      return deposit.secured
        ? `The hold on your card was about to end before the check was finished, so ${amount} was charged. It is still yours: it is paid back, in full or in part, when the check is done.`
        : `${amount} was charged. It is still yours: it is paid back, in full or in part, when the kit is back and checked.`;
    case 'released':
      return `The hold of ${amount} has ended. Nothing was taken from your card.`;
    case 'refunded':
      return `${amount} was paid back to your card. Your bank may take some days to show it.`;
    case 'kept':
      return `The school kept the deposit of ${amount}.`;
    case 'part_kept':
      return `The school kept ${money(deposit.keptMinor)}; ${money(deposit.returnedMinor)} went back to your card.`;
    case 'cancelled':
      return 'Nothing was taken from your card.';
  }
}

function beforePaying(mode: 'hold' | 'charge', amount: string): string {
  return mode === 'hold'
    ? `${amount} will be held on your card, not taken. The hold ends when the kit is back and checked. If a check is still going on when the hold is about to end, the whole amount is charged first and stays yours until the check is done.`
    : `${amount} will be charged to your card and paid back when the kit is back and checked. It is charged because a card can hold an amount for about a week only, and this loan with its check takes longer.`;
}
