import { router } from 'expo-router';
import type { ScannedLabel } from '@shared/api/labels';
import { useSession } from '@/components/api';
import { useLabelQuery, useStartLoanMutation } from '@/components/lending/queries';
import { Button, Card, Failed, LinkButton, Loading, Notice, Stack, Text } from '@/components/ui';
import { LendToSomebody } from './LendToSomebody';

/** What a scanned code is, and the one thing to do with it. */
export function Scanned({ code }: { code: string }) {
  const label = useLabelQuery(code);
  if (label.isPending) return <Loading label="Looking the label up" />;
  if (label.isError) return <Failed error={label.error} onRetry={() => void label.refetch()} />;
  const found = label.data;
  if (found.kind === 'void') {
    return <Notice kind="caution" title="An old label">{`It was ${found.slot === null ? `kit ${found.kitNumber}` : `jar ${found.slot} of kit ${found.kitNumber}`}; a newer label was printed. Scan the newer one, and hand this one to the desk.`}</Notice>;
  }
  return found.kind === 'kit' ? <ScannedKit kit={found} code={code} /> : <ScannedJar jar={found} />;
}

type Kit = Extract<ScannedLabel, { kind: 'kit' }>;
type Jar = Extract<ScannedLabel, { kind: 'jar' }>;

function ScannedKit({ kit, code }: { kit: Kit; code: string }) {
  const { hasRole } = useSession();
  const staff = hasRole('admin', 'instructor');
  const start = useStartLoanMutation();
  if (kit.mine && kit.openLoanId) return <Found title={`Kit ${kit.kitNumber} is with you`} text={kit.neutralTitle} action={<LinkButton kind="primary" label="Open your loan" to={`/loans/${kit.openLoanId}`} />} />;
  const take = () => start.mutate({ code }, { onSuccess: (loan) => router.push(`/loans/${loan.id}`) });
  return (
    <Stack gap="lg">
      <Card title={`Kit ${kit.kitNumber}`} edge={kit.lendable ? 'same' : 'none'}>
        <Text>{kit.neutralTitle}</Text>
        <Text tone="soft">{kit.lendable ? 'It is on the shelf and can be taken out now.' : kit.openLoanId ? 'Somebody has it, or it is being checked.' : 'It cannot be taken out just now. Pick another kit, or ask the desk.'}</Text>
        {start.error ? <Failed error={start.error} /> : null}
        {kit.lendable ? <Button label={`Take out kit ${kit.kitNumber}`} busy={start.isPending} onPress={take} /> : null}
        {staff && kit.openLoanId ? <LinkButton label="Open its loan" to={`/loans/${kit.openLoanId}`} /> : null}
        {staff ? <LinkButton label="Open the kit" to={`/kits/${kit.kitId}`} /> : null}
      </Card>
      {staff && kit.lendable ? <LendToSomebody code={code} /> : null}
    </Stack>
  );
}

function ScannedJar({ jar }: { jar: Jar }) {
  const { hasRole } = useSession();
  const staff = hasRole('admin', 'instructor');
  return (
    <Found
      title={`Jar ${jar.slot} of kit ${jar.kitNumber}`}
      text={`${jar.neutralDescription}. To take the kit out, scan the label of the kit itself.`}
      action={
        jar.mine && jar.openLoanId ? <LinkButton kind="primary" label="Open your loan" to={`/loans/${jar.openLoanId}`} /> : staff ? <LinkButton label="Open the stone" to={`/stones/${jar.stoneId}`} /> : null
      }
    />
  );
}

function Found({ title, text, action }: { title: string; text: string; action: React.ReactNode }) {
  return (
    <Card title={title}>
      <Text>{text}</Text>
      {action}
    </Card>
  );
}
