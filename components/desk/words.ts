import type { DeskLine, DeskView } from '@shared/api/desk';
import type { PaymentState } from '@shared/api/loans';
import type { BadgeState } from '@/components/ui';

export const groupTitles: Readonly<Record<DeskLine['group'], string>> = {
  to_settle: 'Deposit to decide',
  objection: 'Objection to answer',
  set_aside: 'Set aside',
  overdue: 'Overdue',
  to_check: 'To check at the bench',
  due_today: 'Due today',
  going_out: 'Going out now',
  out: 'Out',
};

export const groupBadges: Readonly<Record<DeskLine['group'], BadgeState>> = {
  to_settle: 'different', objection: 'open', set_aside: 'different', overdue: 'different', to_check: 'open', due_today: 'out', going_out: 'neutral', out: 'out',
};

export const depositWords: Readonly<Record<PaymentState | 'none', string>> = {
  none: 'none', opening: 'page opening', open: 'not paid yet', held: 'held', charged: 'charged', released: 'released', kept: 'kept',
  part_kept: 'kept in part', refunded: 'paid back', cancelled: 'cancelled',
};

/** "3 going out, 5 due today, 2 overdue, 1 set aside": what is not there is not said. */
export function deskSummary({ goingOut, out, dueToday, overdue, toCheck, setAside, toSettle }: DeskView['counts']): string {
  const parts = [
    [toSettle, 'to decide'], [setAside, 'set aside'], [overdue, 'overdue'], [toCheck, 'to check'], [dueToday, 'due today'], [goingOut, 'going out'], [out, 'out in all'],
  ] as const;
  const said = parts.filter(([count]) => count > 0).map(([count, words]) => `${count} ${words}`);
  return said.length === 0 ? 'Nothing is out and nothing waits.' : said.join(', ');
}
