import type { StaffLoanRow } from './loans';

/** GET /desk (admin): what now; each line leads to its one next action */
export interface DeskView {
  today: string;
  counts: { goingOut: number; out: number; dueToday: number; overdue: number; toCheck: number; setAside: number; toSettle: number };
  lines: DeskLine[];
}
export interface DeskLine extends StaffLoanRow {
  group: 'to_settle' | 'set_aside' | 'overdue' | 'to_check' | 'due_today' | 'going_out' | 'out' | 'objection';
  next: { label: string; href: string } | null;
}
