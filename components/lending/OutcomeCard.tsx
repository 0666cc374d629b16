import { useState } from 'react';
import type { LoanOutcome, LoanView } from '@shared/api/loans';
import { fieldError } from '@/components/api';
import { Button, Card, Failed, formatDay, Money, Notice, Row, Stack, StateBadge, Text, TextField } from '@/components/ui';
import { stoneBadge } from '@/components/bench/words';
import { useObjectMutation } from './queries';
import { useClock } from './useClock';

/** What was found, what is kept and why, and how to object. */
export function OutcomeCard({ loan, outcome }: { loan: LoanView; outcome: LoanOutcome }) {
  const proposed = outcome.state === 'proposed';
  const kept = outcome.keptMinor > 0;
  return (
    <Card title={!kept ? 'The whole deposit goes back' : proposed ? 'Your school proposes to keep part' : 'What was kept, and why'} edge={kept ? 'open' : 'same'}>
      {proposed ? <Text>Nothing has been kept yet. If you see it differently, say so below before it is decided.</Text> : null}
      <Amount label="Goes back to you" amountMinor={outcome.releasedMinor} currency={outcome.currency} />
      {kept ? <Amount label={proposed ? 'Proposed to keep' : 'Kept'} amountMinor={outcome.keptMinor} currency={outcome.currency} /> : null}
      {outcome.items.map((item) => (
        <Row key={`${item.slot ?? ''}${item.reason}`} justify="space-between" align="flex-start">
          <Text style={{ flex: 1 }} size="quiet">{item.reason}</Text>
          <Money amountMinor={item.amountMinor} currency={outcome.currency} size="quiet" />
        </Row>
      ))}
      {kept ? <Findings outcome={outcome} /> : null}
      {kept ? <ObjectTo loan={loan} outcome={outcome} /> : null}
    </Card>
  );
}

function Amount({ label, amountMinor, currency }: { label: string; amountMinor: number; currency: string }) {
  return (
    <Row justify="space-between">
      <Text strong>{label}</Text>
      <Money amountMinor={amountMinor} currency={currency} strong />
    </Row>
  );
}

function Findings({ outcome }: { outcome: LoanOutcome }) {
  return (
    <Stack gap="sm">
      {outcome.stones.filter((stone) => stone.ending !== null).map((stone) => (
        <Stack key={stone.slot} gap="xxs">
          <Row justify="space-between">
            <Text>{`${stone.slot}: ${stone.neutralDescription}`}</Text>
            <StateBadge {...stoneBadge({ ending: stone.ending, step: 'ended' })} />
          </Row>
          {stone.finding ? <Text size="quiet" tone="soft">{stone.finding}</Text> : null}
        </Stack>
      ))}
    </Stack>
  );
}

function ObjectTo({ loan, outcome }: { loan: LoanView; outcome: LoanOutcome }) {
  const [text, setText] = useState('');
  const object = useObjectMutation(loan.id);
  const clock = useClock();
  if (outcome.objection) {
    return (
      <Notice kind="info" title={outcome.objection.answer ? 'Your objection was answered' : 'Your objection is with the school'}>
        <Text size="quiet">{outcome.objection.text}</Text>
        {outcome.objection.answer ? <Text size="quiet" strong>{outcome.objection.answer}</Text> : null}
      </Notice>
    );
  }
  if (!loan.actions.includes('object')) return null;
  return (
    <Stack>
      <Text size="quiet" tone="soft">{`A verdict is evidence about a stone, not about you. If something is wrong or there is a reason we do not know, tell the school${outcome.objectUntil ? ` until ${formatDay(outcome.objectUntil, clock)}` : ''}; an admin answers.`}</Text>
      <TextField label="Your objection" lines={3} value={text} onChange={setText} error={fieldError(object.error, 'text')} maxLength={4000} />
      {object.error && !fieldError(object.error, 'text') ? <Failed error={object.error} /> : null}
      <Button kind="secondary" label="Send the objection" busy={object.isPending} onPress={() => object.mutate({ text })} />
    </Stack>
  );
}
