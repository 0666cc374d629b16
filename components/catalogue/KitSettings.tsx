import { useState } from 'react';
import type { KitStanding, KitView } from '@shared/api/kits';
import { fieldError } from '@/components/api';
import { Button, Card, Dialog, Failed, Stack, Text, TextField, useAnnounce } from '@/components/ui';
import { KitForm } from './KitForm';
import { useKitChangeMutation } from './queries';

/** A kit's titles, and its standing: set aside, lent again, retired. */
export function KitSettings({ kit }: { kit: KitView }) {
  const change = useKitChangeMutation(kit.id);
  const announce = useAnnounce();
  return (
    <Stack gap="lg">
      <Card title="Titles">
        <KitForm
          key={kit.version}
          initial={{ number: kit.number, title: kit.title, neutralTitle: kit.neutralTitle }}
          submitLabel="Save the titles"
          busy={change.isPending}
          error={change.error}
          onSubmit={({ title, neutralTitle }) => change.mutate({ version: kit.version, title, neutralTitle }, { onSuccess: () => announce('Saved') })}
        />
      </Card>
      <Card title="Standing">
        {kit.standing === 'lendable' ? <Standing kit={kit} to="set_aside" label="Set aside" text="It cannot be taken out until it is put back into lending." /> : null}
        {kit.standing === 'set_aside' ? <Standing kit={kit} to="lendable" label="Put back into lending" text="Every stone must be in its jar and its record complete. Say what was done." /> : null}
        {kit.standing === 'retired' ? <Text>This kit is retired. Its record and custody stay.</Text> : <Standing kit={kit} to="retired" label="Retire the kit" text="It leaves lending for good. Its record and custody stay." />}
      </Card>
    </Stack>
  );
}

function Standing({ kit, to, label, text }: { kit: KitView; to: KitStanding; label: string; text: string }) {
  const [open, setOpen] = useState(false);
  const [reason, setReason] = useState('');
  const change = useKitChangeMutation(kit.id);
  const save = () => change.mutate({ version: kit.version, standing: to, standingReason: reason }, { onSuccess: () => setOpen(false) });
  return (
    <>
      <Button kind={to === 'retired' ? 'quiet' : 'secondary'} label={label} haspopup="dialog" onPress={() => setOpen(true)} />
      <Dialog open={open} onClose={() => setOpen(false)} title={`${label}?`} action={<Button kind={to === 'retired' ? 'danger' : 'primary'} label={label} busy={change.isPending} onPress={save} />}>
        <Stack>
          <Text>{text}</Text>
          <TextField label="Reason" required value={reason} onChange={setReason} error={fieldError(change.error, 'standingReason')} maxLength={500} />
          {change.error && !fieldError(change.error, 'standingReason') ? <Failed error={change.error} /> : null}
        </Stack>
      </Dialog>
    </>
  );
}
