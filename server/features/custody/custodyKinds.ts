/** Every kind of custody event, with its words. `{who}` is the actor, `{for}` the person it was done for, `{reason}` and `{condition}` come from the detail. */
export const custodyTexts = {
  kit_catalogued: 'Kit catalogued by {who}',
  kit_changed: 'Kit details changed by {who}',
  kit_set_aside: 'Kit set aside: {reason}',
  kit_lendable: 'Kit lent again by {who}: {reason}',
  kit_retired: 'Kit retired by {who}: {reason}',
  stone_catalogued: 'Stone catalogued by {who}',
  stone_changed: 'Stone record changed by {who}',
  stone_retired: 'Stone retired by {who}',
  intake_read: 'Readings recorded at the bench by {who}',
  reading_struck: 'A reading struck by {who}: {reason}',
  label_issued: 'Label printed by {who}',
  label_voided: 'Earlier label made void by {who}',
  kit_reserved: 'Reserved for {for} by {who}',
  jar_seen_out: 'Jar seen at take-out: {condition}',
  jar_absent: 'Jar not there at take-out',
  terms_accepted: 'Terms accepted by {who}',
  kit_out: 'Taken out by {for}',
  loan_cancelled: 'Loan cancelled: {reason}',
  kit_returned: 'Put in the return box by {who}',
  jar_back: 'Jar brought back: {condition}',
  jar_said_missing: 'Jar said to be missing at return',
  jar_said_damaged: 'Stone said to be damaged at return: {condition}',
  bench_opened: 'Bench check begun by {who}',
  jar_seen_bench: 'Jar seen at the bench',
  jar_missing_bench: 'Jar missing at the bench',
  jar_damaged_bench: 'Damage seen at the bench: {condition}',
  stone_read: 'Stone read by {who}',
  verdict_reached: 'Verdict: {verdict}',
  second_reading_asked: 'Second reading asked for by {who}',
  stone_accepted: 'Accepted by {who}: {reason}',
  stone_ended: 'Stone settled as {ending}: {reason}',
  check_done: 'Bench check finished',
  deposit_decided: 'Deposit decided by {who}',
  objection_made: 'Objection made by {who}',
  objection_answered: 'Objection answered by {who}',
} as const;

export type CustodyKind = keyof typeof custodyTexts;

/** What an event remembers beside its kind. Nothing personal: people are named by id in columns of their own. */
export interface CustodyDetail {
  reason?: string;
  condition?: string;
  verdict?: string;
  ending?: string;
  code?: string;
}

export function custodyText(event: { kind: CustodyKind; detail: CustodyDetail; who: string; for: string }): string {
  const words: Record<string, string> = {
    who: event.who,
    for: event.for,
    reason: event.detail.reason ?? 'no reason given',
    condition: event.detail.condition?.trim() ? event.detail.condition : 'nothing noted',
    verdict: event.detail.verdict ?? '',
    ending: event.detail.ending ?? '',
  };
  return custodyTexts[event.kind].replace(/\{(\w+)\}/g, (_, name: string) => words[name] ?? '');
}
