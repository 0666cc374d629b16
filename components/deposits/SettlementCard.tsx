import { useState } from 'react';
import type { SettlementView } from '@shared/api/settlement';
import { Button, Card, Dialog, Failed, formatMoney, Loading, Money, Notice, Row, Stack, Text, TextField, useAnnounce } from '@/components/ui';
import { keepDrafts, keptItems, type KeepDraft } from './keepDraft';
import { useAnswerObjectionMutation, useDecideMutation, useProposeMutation, useSettlementQuery } from './queries';

/** The money question of one loan, for the admin: propose, then decide once; answer an objection. */
export function SettlementCard({ loanId }: { loanId: string }) {
  const settlement = useSettlementQuery(loanId, true);
  if (settlement.isPending) return <Loading label="Fetching the deposit" />;
  if (settlement.isError) return <Failed error={settlement.error} onRetry={() => void settlement.refetch()} />;
  const view = settlement.data;
  const decided = view.outcome !== null && view.outcome.state !== 'proposed';
  return (
    <Card title={decided ? 'Deposit decided' : 'Decide the deposit'} edge={decided ? 'none' : 'open'}>
      {decided ? <Decided view={view} /> : view.ready ? <Decide key={view.loanId} view={view} /> : <Text>{view.waitingFor}</Text>}
    </Card>
  );
}

function Decide({ view }: { view: SettlementView }) {
  const [drafts, setDrafts] = useState<KeepDraft[]>(() => keepDrafts(view.stones));
  const [faults, setFaults] = useState<Record<string, string>>({});
  const [confirm, setConfirm] = useState(false);
  const propose = useProposeMutation(view.loanId);
  const decide = useDecideMutation(view.loanId);
  const announce = useAnnounce();
  const kept = keptItems(drafts, view.currency);
  const total = kept.ok ? kept.totalMinor : 0;
  const over = total > view.depositMinor;
  const withItems = (act: (items: Extract<typeof kept, { ok: true }>['items']) => void) => {
    setFaults(kept.ok ? {} : kept.faults);
    if (kept.ok && !over) act(kept.items);
  };
  const change = (stoneId: string, part: Partial<KeepDraft>) => setDrafts((before) => before.map((draft) => (draft.stoneId === stoneId ? { ...draft, ...part } : draft)));
  return (
    <Stack gap="lg">
      <Text>Keep part or all with a reason for each stone, or leave every amount empty to release the whole deposit. It is decided once.</Text>
      {view.outcome ? <Notice kind="info" title="Proposed to the borrower">They can see what and why, and object. Nothing has been kept yet.</Notice> : null}
      {drafts.map((draft) => (
        <Stack key={draft.stoneId} gap="sm">
          <TextField label={`Jar ${draft.slot}: reason`} lines={2} value={draft.reason} error={faults[`${draft.stoneId}.reason`]} onChange={(reason) => change(draft.stoneId, { reason })} maxLength={500} />
          <TextField label={`Jar ${draft.slot}: keep, ${view.currency}`} mono inputMode="decimal" value={draft.amount} error={faults[`${draft.stoneId}.amount`]} onChange={(amount) => change(draft.stoneId, { amount })} />
        </Stack>
      ))}
      <Totals keptMinor={total} view={view} />
      {over ? <Text tone="different" role="alert">{`That is more than the deposit of ${formatMoney(view.depositMinor, view.currency)}. Lower an amount.`}</Text> : null}
      {propose.error ? <Failed error={propose.error} /> : null}
      {total > 0 && !view.outcome ? (
        <Button kind="secondary" label="Show it to the borrower first" busy={propose.isPending} onPress={() => withItems((items) => propose.mutate({ items }, { onSuccess: () => announce('Shown to the borrower.') }))} />
      ) : null}
      <Button label={total > 0 ? `Keep ${formatMoney(total, view.currency)}` : 'Release the whole deposit'} onPress={() => withItems(() => setConfirm(true))} />
      <Dialog
        open={confirm}
        onClose={() => setConfirm(false)}
        title={total > 0 ? `Keep ${formatMoney(total, view.currency)}?` : 'Release the whole deposit?'}
        action={<Button label="Decide" busy={decide.isPending} onPress={() => withItems((items) => decide.mutate({ items }, { onSuccess: () => { setConfirm(false); announce('The deposit is decided.'); } }))} />}
      >
        <Stack>
          <Totals keptMinor={total} view={view} />
          <Text>{`${view.borrower.name} gets an e-mail with each reason, and can object. This is decided once.`}</Text>
          {decide.error ? <Failed error={decide.error} /> : null}
        </Stack>
      </Dialog>
    </Stack>
  );
}

function Totals({ keptMinor, view }: { keptMinor: number; view: SettlementView }) {
  return (
    <Stack gap="xs">
      <Line label="Deposit" amountMinor={view.depositMinor} currency={view.currency} />
      <Line label="Keep" amountMinor={keptMinor} currency={view.currency} />
      <Line label="Goes back" amountMinor={Math.max(0, view.depositMinor - keptMinor)} currency={view.currency} />
    </Stack>
  );
}

function Line({ label, amountMinor, currency }: { label: string; amountMinor: number; currency: string }) {
  return (
    <Row justify="space-between">
      <Text tone="soft">{label}</Text>
      <Money amountMinor={amountMinor} currency={currency} />
    </Row>
  );
}

function Decided({ view }: { view: SettlementView }) {
  const { outcome } = view;
  if (outcome === null) return null;
  return (
    <Stack>
      <Totals keptMinor={outcome.keptMinor} view={view} />
      {outcome.items.map((item) => (
        <Row key={`${item.slot ?? ''}${item.reason}`} justify="space-between" align="flex-start">
          <Text style={{ flex: 1 }}>{item.reason}</Text>
          <Money amountMinor={item.amountMinor} currency={view.currency} />
        </Row>
      ))}
      <Text size="quiet" tone="soft">{outcome.state === 'done' ? 'The payment service has moved the money.' : 'The payment service is being told; this finishes by itself.'}</Text>
      {outcome.objection ? <Objection view={view} objection={outcome.objection} /> : null}
    </Stack>
  );
}

function Objection({ view, objection }: { view: SettlementView; objection: { text: string; answer: string | null } }) {
  const [answer, setAnswer] = useState('');
  const send = useAnswerObjectionMutation(view.loanId);
  return (
    <Stack>
      <Notice kind="info" title={`${view.borrower.name} objects`}>{objection.text}</Notice>
      {objection.answer ? (
        <Text>{`Answered: ${objection.answer}`}</Text>
      ) : (
        <>
          <TextField label="Your answer" lines={3} required value={answer} onChange={setAnswer} maxLength={4000} />
          {send.error ? <Failed error={send.error} /> : null}
          <Button label="Answer" busy={send.isPending} onPress={() => send.mutate({ answer })} />
        </>
      )}
    </Stack>
  );
}
