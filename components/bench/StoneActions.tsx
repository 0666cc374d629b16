import { useState } from 'react';
import type { BenchStone } from '@shared/api/bench';
import { fieldError, useSession } from '@/components/api';
import { Button, Card, Dialog, Failed, Notice, Stack, Text, TextField, useAnnounce } from '@/components/ui';
import { useAcceptStoneMutation, useEndStoneMutation, useSecondReadingMutation } from './queries';

/** What people can do about a stone beyond reading it: ask a colleague, accept together, or the admin's word. */
export function StoneActions({ loanId, stone }: { loanId: string; stone: BenchStone }) {
  const { hasRole } = useSession();
  if (stone.ending !== null) return null;
  const latest = stone.opened?.verdicts.at(-1);
  const mayAsk = hasRole('instructor') && stone.opened !== null && latest !== undefined && latest.verdict !== 'same' && latest.basis === 'first';
  return (
    <Stack gap="md">
      {mayAsk ? <AskSecond loanId={loanId} stone={stone} /> : null}
      {stone.step === 'two_people' ? <Accept loanId={loanId} stone={stone} /> : null}
      {hasRole('admin') && stone.benchState !== null && stone.step !== 'scan' ? <AdminEnding loanId={loanId} stone={stone} /> : null}
      {!hasRole('admin') && stone.step === 'admin' ? (
        <Notice kind="info" title="For the admin">{`Jar ${stone.slot} was noted as ${stone.benchState ?? ''}. An admin settles it with a reason; damage wants a photo.`}</Notice>
      ) : null}
    </Stack>
  );
}

function AskSecond({ loanId, stone }: { loanId: string; stone: BenchStone }) {
  const ask = useSecondReadingMutation(loanId, stone.stoneId);
  const announce = useAnnounce();
  if (stone.step === 'second_reader' && ask.isSuccess) return null;
  return (
    <Card title="A second pair of eyes">
      <Text>The kit is set aside and a colleague reads this stone without seeing the record or your readings. Nothing is said about anybody, and no money moves, before that.</Text>
      {ask.error ? <Failed error={ask.error} /> : null}
      <Button kind="secondary" label="Set aside and ask for a second reading" busy={ask.isPending} onPress={() => ask.mutate(undefined, { onSuccess: () => announce('Kit set aside. A second reading is asked for.') })} />
    </Card>
  );
}

function Accept({ loanId, stone }: { loanId: string; stone: BenchStone }) {
  const [reason, setReason] = useState('');
  const accept = useAcceptStoneMutation(loanId, stone.stoneId);
  const { account } = useSession();
  const done = stone.opened?.acceptances.some((one) => one.by.id === account?.id) ?? false;
  if (done) return <Notice kind="info" title="You have accepted this stone">A second person must accept it too.</Notice>;
  return (
    <Card title="Two people decide">
      <Text>The readings leave it open. If you take it as the recorded stone, say why; a second person does the same.</Text>
      <TextField label="Why you accept it" required lines={2} value={reason} onChange={setReason} error={fieldError(accept.error, 'reason')} maxLength={500} />
      {accept.error && !fieldError(accept.error, 'reason') ? <Failed error={accept.error} /> : null}
      <Button kind="secondary" label="Accept as the recorded stone" busy={accept.isPending} onPress={() => accept.mutate({ reason })} />
    </Card>
  );
}

function AdminEnding({ loanId, stone }: { loanId: string; stone: BenchStone }) {
  const ending = stone.benchState === 'seen' ? 'mixed_up' : stone.benchState === 'missing' ? 'missing' : 'damaged';
  const words = endingWords[ending];
  const [open, setOpen] = useState(false);
  const [reason, setReason] = useState('');
  const end = useEndStoneMutation(loanId, stone.stoneId);
  return (
    <>
      <Button kind="secondary" label={words.button} haspopup="dialog" onPress={() => setOpen(true)} />
      <Dialog
        open={open}
        onClose={() => setOpen(false)}
        title={`Jar ${stone.slot}: ${words.title}`}
        action={<Button label="Settle this stone" busy={end.isPending} onPress={() => end.mutate({ ending, reason }, { onSuccess: () => setOpen(false) })} />}
      >
        <Stack>
          <Text>{words.text}</Text>
          <TextField label="Reason" required lines={2} value={reason} onChange={setReason} error={fieldError(end.error, 'reason')} maxLength={500} />
          {end.error && !fieldError(end.error, 'reason') ? <Failed error={end.error} /> : null}
        </Stack>
      </Dialog>
    </>
  );
}

const endingWords = {
  missing: { button: 'Settle as missing', title: 'missing', text: 'No verdict is needed for a stone that is not there. The deposit is decided separately.' },
  damaged: { button: 'Settle as damaged', title: 'damaged', text: 'Add a photo of the damage on the stone’s page first. The deposit is decided separately.' },
  mixed_up: { button: 'Jars were mixed up, now put right', title: 'jars mixed up', text: 'Use this when two stones of this kit were in each other’s jars and you have put them right.' },
} as const;
