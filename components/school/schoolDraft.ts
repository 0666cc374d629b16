import type { DepositRule, SchoolChange, SchoolView } from '@shared/api/school';
import { formatMinor, parseMoney } from '@shared/money';
import { parseNumber } from '@/components/ui';

/** A school's settings as they are being typed. */
export interface SchoolDraft {
  name: string;
  timeZone: string;
  currency: string;
  closingTime: string;
  loanDays: string;
  lateGraceHours: string;
  checkingDays: string;
  reservationMinutes: string;
  objectionDays: string;
  ruleKind: DepositRule['kind'];
  fixed: string;
  percent: string;
  minimum: string;
  maximum: string;
}

export function draftOf(school: SchoolView): SchoolDraft {
  const { depositRule: rule, currency } = school;
  const money = (minor: number | null) => (minor === null ? '' : formatMinor(minor, currency));
  return {
    name: school.name, timeZone: school.timeZone, currency, closingTime: school.closingTime,
    loanDays: String(school.loanDays), lateGraceHours: String(school.lateGraceHours), checkingDays: String(school.checkingDays),
    reservationMinutes: String(school.reservationMinutes), objectionDays: String(school.objectionDays),
    ruleKind: rule.kind,
    fixed: rule.kind === 'fixed' ? money(rule.amountMinor) : '',
    percent: rule.kind === 'share' ? String(rule.percent) : '',
    minimum: rule.kind === 'share' ? money(rule.minimumMinor) : money(0),
    maximum: rule.kind === 'share' ? money(rule.maximumMinor) : '',
  };
}

export type Change = { ok: true; change: SchoolChange } | { ok: false; faults: Partial<Record<keyof SchoolDraft, string>> };

const whole = ['loanDays', 'lateGraceHours', 'checkingDays', 'reservationMinutes', 'objectionDays'] as const;

/** The draft as the server takes it, or what is wrong with it by field. */
export function changeOf(draft: SchoolDraft): Change {
  const faults: Partial<Record<keyof SchoolDraft, string>> = {};
  const numbers: Partial<Record<(typeof whole)[number], number>> = {};
  for (const key of whole) {
    const value = parseNumber(draft[key]);
    if (value === null || !Number.isInteger(value)) faults[key] = 'Type a whole number.';
    else numbers[key] = value;
  }
  const rule = ruleOf(draft, faults);
  if (Object.keys(faults).length > 0 || rule === null) return { ok: false, faults };
  const { name, timeZone, currency, closingTime } = draft;
  return { ok: true, change: { name: name.trim(), timeZone: timeZone.trim(), currency: currency.trim().toUpperCase(), closingTime, depositRule: rule, ...numbers } };
}

function ruleOf(draft: SchoolDraft, faults: Partial<Record<keyof SchoolDraft, string>>): DepositRule | null {
  const money = (key: 'fixed' | 'minimum' | 'maximum'): number => {
    const parsed = parseMoney(draft[key], draft.currency.trim().toUpperCase() || 'EUR');
    if (!parsed.ok) faults[key] = 'Type an amount, such as 60.00.';
    return parsed.ok ? parsed.amountMinor : 0;
  };
  if (draft.ruleKind === 'fixed') return { kind: 'fixed', amountMinor: money('fixed') };
  const percent = parseNumber(draft.percent);
  if (percent === null) faults.percent = 'Type a number, such as 30.';
  return { kind: 'share', percent: percent ?? 0, minimumMinor: money('minimum'), maximumMinor: draft.maximum.trim() === '' ? null : money('maximum') };
}
