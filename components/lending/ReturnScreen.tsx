import { router, useLocalSearchParams } from 'expo-router';
import { useState } from 'react';
import type { ScannedLabel } from '@shared/api/labels';
import type { BackState, LoanView } from '@shared/api/loans';
import { ApiProblem, useApi } from '@/components/api';
import { ScanPanel } from '@/components/scan/ScanPanel';
import { Button, Card, Failed, List, Loading, Notice, PageFrame, Stack, Text, useAnnounce } from '@/components/ui';
import { useMutation } from '@tanstack/react-query';
import { useLoanQuery, useReturnLoanMutation } from './queries';
import { ReturnJar } from './ReturnJar';

export interface Said { state: BackState; condition: string }

/** Bringing back: the kit's jars scanned one by one; what is missing or damaged is said, not guessed. */
export function ReturnScreen() {
  const { loanId } = useLocalSearchParams<{ loanId: string }>();
  const loan = useLoanQuery(loanId);
  return (
    <PageFrame title={loan.data ? `Return kit ${loan.data.kitNumber}` : 'Return a kit'} back={{ label: 'Loan', to: `/loans/${loanId}` }} lead="Scan each jar, with its own stone in it, then put the kit in the return box.">
      {loan.isPending ? <Loading label="Fetching the loan" /> : null}
      {loan.isError ? <Failed error={loan.error} onRetry={() => void loan.refetch()} /> : null}
      {loan.data ? loan.data.state === 'out' ? <ReturnJars loan={loan.data} /> : <Notice kind="info" title="This kit is not out">It was brought back already, or never left. Open the loan to see where it stands.</Notice> : null}
    </PageFrame>
  );
}

function ReturnJars({ loan }: { loan: LoanView }) {
  const [said, setSaid] = useState<Record<string, Said>>({});
  const send = useReturnLoanMutation(loan.id);
  const scan = useScanJar(loan, (stoneId) => setSaid((before) => ({ ...before, [stoneId]: { state: 'seen', condition: before[stoneId]?.condition ?? '' } })));
  const count = loan.jars.filter((jar) => said[jar.stoneId] !== undefined).length;
  const unsaid = loan.jars.filter((jar) => said[jar.stoneId] === undefined);
  const submit = () => {
    const stones = loan.jars.flatMap((jar) => {
      const word = said[jar.stoneId];
      return word === undefined ? [] : [{ stoneId: jar.stoneId, state: word.state, condition: word.condition }];
    });
    send.mutate({ stones }, { onSuccess: () => router.replace(`/loans/${loan.id}`) });
  };
  return (
    <Stack gap="lg">
      {unsaid.length > 0 ? <ScanPanel prompt={`Scan each jar. ${count} of ${loan.jars.length} seen.`} busy={scan.isPending} error={scan.error} onCode={(code) => scan.mutate(code)} /> : null}
      <Card padded={false} title="Jars">
        <List label="Jars of the kit">
          {loan.jars.map((jar, index) => (
            <ReturnJar key={jar.stoneId} jar={jar} said={said[jar.stoneId] ?? null} last={index === loan.jars.length - 1} onSay={(word) => setSaid((before) => ({ ...before, [jar.stoneId]: word }))} />
          ))}
        </List>
      </Card>
      {send.error ? <Failed error={send.error} /> : null}
      {unsaid.length > 0 ? <Text size="quiet" tone="soft">{`Still to say: jar ${unsaid.map((jar) => jar.slot).join(', ')}.`}</Text> : null}
      <Button label="Put it in the return box" busy={send.isPending} disabled={unsaid.length > 0} onPress={submit} />
    </Stack>
  );
}

/** Looks a scanned code up and takes it only for a jar of this kit; another kit's jar is named. */
function useScanJar(loan: LoanView, onSeen: (stoneId: string) => void) {
  const api = useApi();
  const announce = useAnnounce();
  return useMutation({
    mutationFn: async (code: string) => {
      const label = await api.get<ScannedLabel>(`/labels/${code}`);
      if (label.kind === 'void') throw refusal('This is an old label; a newer one was printed. Scan the newer one.');
      if (label.kitId !== loan.kitId) throw refusal(`This ${label.kind} belongs to kit ${label.kitNumber}. Scan a jar of kit ${loan.kitNumber}.`);
      if (label.kind === 'kit') throw refusal('That is the label of the kit. Scan its jars, one by one.');
      return label;
    },
    onSuccess: (label) => {
      onSeen(label.stoneId);
      announce(`Jar ${label.slot} seen`);
    },
  });
}

/** A refusal found here, in the shape in which the server would have said it. */
function refusal(message: string): ApiProblem {
  return new ApiProblem(422, { code: 'label', title: 'Another label', detail: message, errors: [{ field: 'code', message }] });
}
