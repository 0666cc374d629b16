import { useState } from 'react';
import type { LoanView } from '@shared/api/loans';
import { Button, Card, CheckboxField, Failed, Form, Text } from '@/components/ui';
import { useAcceptTermsMutation } from './queries';

/** The school's terms in full, accepted in the version shown. */
export function TermsStep({ loan }: { loan: LoanView }) {
  const [agreed, setAgreed] = useState(false);
  const [missing, setMissing] = useState(false);
  const accept = useAcceptTermsMutation(loan.id);
  const submit = () => {
    setMissing(!agreed);
    if (agreed) accept.mutate({ termsVersionId: loan.terms.versionId });
  };
  return (
    <Card title="Terms of your school">
      {loan.terms.text.split('\n').filter((line) => line.trim() !== '').map((line) => (
        <Text key={line}>{line}</Text>
      ))}
      <Form label="Accept the terms" onSubmit={submit}>
        <CheckboxField label="I have read these terms and accept them" checked={agreed} onChange={setAgreed} error={missing && !agreed ? 'Tick this to go on, or cancel below.' : undefined} />
        {accept.error ? <Failed error={accept.error} /> : null}
        <Button label="Accept and go on" submits busy={accept.isPending} />
      </Form>
    </Card>
  );
}
