import { useState } from 'react';
import type { SchoolView } from '@shared/api/school';
import { fieldError } from '@/components/api';
import { Button, Failed, Form, NumberField, SegmentedField, TextField, useAnnounce } from '@/components/ui';
import { useSchoolChangeMutation } from './queries';
import { changeOf, draftOf, type SchoolDraft } from './schoolDraft';

/** Fields of the server's answer that belong to an input of this form. */
const serverFields: Partial<Record<keyof SchoolDraft, string>> = {
  fixed: 'depositRule.amountMinor', percent: 'depositRule.percent', minimum: 'depositRule.minimumMinor', maximum: 'depositRule.maximumMinor',
};

/** Times, lengths and the deposit rule, each with its effect in words. */
export function SchoolForm({ school }: { school: SchoolView }) {
  const [draft, setDraft] = useState(() => draftOf(school));
  const [faults, setFaults] = useState<Partial<Record<keyof SchoolDraft, string>>>({});
  const change = useSchoolChangeMutation();
  const announce = useAnnounce();
  const submit = () => {
    const result = changeOf(draft);
    setFaults(result.ok ? {} : result.faults);
    if (result.ok) change.mutate(result.change, { onSuccess: () => announce('Settings saved') });
  };
  const bind = (key: keyof SchoolDraft) => ({
    value: draft[key],
    onChange: (value: string) => setDraft((before) => ({ ...before, [key]: value })),
    error: faults[key] ?? fieldError(change.error, serverFields[key] ?? key),
  });
  const named = (Object.keys(draft) as (keyof SchoolDraft)[]).some((key) => fieldError(change.error, serverFields[key] ?? key));
  return (
    <Form label="Settings" onSubmit={submit}>
      <TextField label="Name of the school" required {...bind('name')} maxLength={120} />
      <TextField label="Time zone" hint="IANA name, for instance Europe/Dublin; due times are said and kept in it" required {...bind('timeZone')} />
      <TextField label="Currency" hint="ISO 4217, three letters" required mono {...bind('currency')} maxLength={3} />
      <TextField label="Closing time" hint="HH:MM; a loan is due at this time of its last day" required mono {...bind('closingTime')} maxLength={5} />
      <NumberField label="Length of a loan" unit="days" hint="Up to about four days a deposit can be held on the card; a longer loan is charged and paid back" {...bind('loanDays')} />
      <NumberField label="Grace after the due time" unit="hours" {...bind('lateGraceHours')} />
      <NumberField label="Time for the bench check" unit="days" {...bind('checkingDays')} />
      <NumberField label="An unpaid take-out keeps the kit for" unit="minutes" hint="At least 30: the payment page cannot be opened for less" {...bind('reservationMinutes')} />
      <NumberField label="A student may object for" unit="days" {...bind('objectionDays')} />
      <SegmentedField
        label="Deposit"
        options={[{ value: 'fixed', label: 'the same for every kit' }, { value: 'share', label: 'a share of its value' }]}
        value={draft.ruleKind}
        onChange={(ruleKind) => setDraft((before) => ({ ...before, ruleKind }))}
      />
      {draft.ruleKind === 'fixed' ? (
        <TextField label={`Amount, ${draft.currency}`} mono inputMode="decimal" {...bind('fixed')} />
      ) : (
        <>
          <NumberField label="Share of the replacement value" unit="%" {...bind('percent')} />
          <TextField label={`At least, ${draft.currency}`} mono inputMode="decimal" {...bind('minimum')} />
          <TextField label={`At most, ${draft.currency}`} optional mono inputMode="decimal" {...bind('maximum')} />
        </>
      )}
      {change.error && !named ? <Failed error={change.error} /> : null}
      <Button label="Save the settings" submits busy={change.isPending} />
    </Form>
  );
}
