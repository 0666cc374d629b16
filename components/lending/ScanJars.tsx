import { useState } from 'react';
import type { LoanJar, LoanView } from '@shared/api/loans';
import { useSession } from '@/components/api';
import { ScanPanel } from '@/components/scan/ScanPanel';
import { Button, Card, Dialog, Failed, List, ListRow, Mono, Stack, StateBadge, Text, TextField, useAnnounce } from '@/components/ui';
import { useSeeJarMutation } from './queries';

/** Scan each jar; note what can be seen of its stone; say when a jar is not there. */
export function ScanJars({ loan }: { loan: LoanView }) {
  const see = useSeeJarMutation(loan.id);
  const announce = useAnnounce();
  const seen = loan.jars.filter((jar) => jar.outSeenAt !== null).length;
  const next = loan.jars.find((jar) => jar.outSeenAt === null);
  return (
    <Stack gap="lg">
      <ScanPanel
        prompt={`Scan each stone’s jar. ${seen} of ${loan.jars.length} seen.`}
        busy={see.isPending}
        error={see.error}
        cameraFirst={seen > 0}
        onCode={(code) => see.mutate({ code }, { onSuccess: () => announce('Jar seen') })}
      />
      <Card padded={false} title="Jars">
        <List label="Jars of the kit">
          {loan.jars.map((jar, index) => (
            <ListRow
              key={jar.stoneId}
              inset
              rule={index < loan.jars.length - 1}
              before={<Mono strong>{jar.slot}</Mono>}
              title={jar.neutralDescription}
              detail={jar.outCondition || 'no marks noted'}
              after={<JarState jar={jar} isNext={jar.stoneId === next?.stoneId} />}
            >
              <JarNote loan={loan} jar={jar} />
            </ListRow>
          ))}
        </List>
      </Card>
    </Stack>
  );
}

function JarState({ jar, isNext }: { jar: LoanJar; isNext: boolean }) {
  if (jar.outSeenAt !== null) return <StateBadge state="same" label="seen" />;
  return <StateBadge state={isNext ? 'out' : 'neutral'} label={isNext ? 'scan next' : 'not yet'} />;
}

/** A note on a jar that was seen; for one that was not, a way to say that it is absent. */
function JarNote({ loan, jar }: { loan: LoanView; jar: LoanJar }) {
  const { hasRole } = useSession();
  const [open, setOpen] = useState(false);
  const [condition, setCondition] = useState(jar.outCondition);
  const see = useSeeJarMutation(loan.id);
  const seen = jar.outSeenAt !== null;
  const close = () => setOpen(false);
  return (
    <>
      <Button
        kind="quiet"
        label={seen ? 'Note a mark' : 'Not there?'}
        accessibleLabel={seen ? `Note a mark on jar ${jar.slot}` : `Jar ${jar.slot} is not there`}
        haspopup="dialog"
        onPress={() => setOpen(true)}
        style={{ alignSelf: 'flex-start', paddingHorizontal: 0 }}
      />
      <Dialog
        open={open}
        onClose={close}
        title={seen ? `Jar ${jar.slot}: what can be seen?` : `Jar ${jar.slot} is not in the kit?`}
        action={
          seen ? (
            <Button label="Save the note" busy={see.isPending} onPress={() => see.mutate({ stoneId: jar.stoneId, condition }, { onSuccess: close })} />
          ) : (
            <Button kind="danger" label="It is not there: stop" busy={see.isPending} onPress={() => see.mutate({ stoneId: jar.stoneId, absent: true }, { onSuccess: close })} />
          )
        }
      >
        <Stack>
          {seen ? (
            <TextField label="Chips, scratches, a loose label" lines={2} value={condition} onChange={setCondition} maxLength={300} />
          ) : (
            <Text>The take-out stops, nothing is held or charged, and an admin looks for it. It is good that you say so now: nobody will ask you for it.</Text>
          )}
          {!seen && hasRole('admin', 'instructor') ? (
            <Button kind="secondary" label="It is here, the label cannot be scanned" busy={see.isPending} onPress={() => see.mutate({ stoneId: jar.stoneId }, { onSuccess: close })} />
          ) : null}
          {see.error ? <Failed error={see.error} /> : null}
        </Stack>
      </Dialog>
    </>
  );
}
