import { useState } from 'react';
import { fieldError } from '@/components/api';
import { useClock } from '@/components/lending/useClock';
import { Button, Card, Failed, Form, formatDay, Loading, Text, TextField, useAnnounce } from '@/components/ui';
import { useNewTermsMutation, useTermsQuery } from './queries';

/** The terms that borrowers accept. Each change is a new version; a loan keeps the one that was accepted. */
export function TermsCard() {
  const terms = useTermsQuery();
  if (terms.isPending) return <Loading label="Fetching the terms" />;
  if (terms.isError) return <Failed error={terms.error} onRetry={() => void terms.refetch()} />;
  return (
    <Card title="Terms of lending">
      <NewVersion key={terms.data.current.id} text={terms.data.current.text} version={terms.data.current.version} />
      <Versions versions={terms.data.versions} />
    </Card>
  );
}

function NewVersion({ text: current, version }: { text: string; version: number }) {
  const [text, setText] = useState(current);
  const add = useNewTermsMutation();
  const announce = useAnnounce();
  return (
    <Form label="Terms" onSubmit={() => add.mutate({ text }, { onSuccess: () => announce(`Version ${version + 1} holds from now on`) })}>
      <TextField label={`Version ${version}`} hint="Say what is held or charged, when a hold is secured, what may be kept and by whom, and how to object." lines={12} value={text} onChange={setText} error={fieldError(add.error, 'text')} maxLength={20000} />
      {add.error && !fieldError(add.error, 'text') ? <Failed error={add.error} /> : null}
      <Button kind="secondary" label="Save as a new version" submits busy={add.isPending} disabled={text.trim() === current.trim()} />
    </Form>
  );
}

function Versions({ versions }: { versions: readonly { id: string; version: number; createdAt: string }[] }) {
  const clock = useClock();
  return (
    <Text size="quiet" tone="soft">
      {versions.map((one) => `Version ${one.version} since ${formatDay(one.createdAt, clock)}`).join('. ')}.
    </Text>
  );
}
