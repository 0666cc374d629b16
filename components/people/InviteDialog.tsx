import { useState } from 'react';
import type { Role } from '@shared/api/common';
import { fieldError } from '@/components/api';
import { Button, Dialog, Failed, Form, Text, TextField, useAnnounce } from '@/components/ui';
import { useInviteMutation } from './queries';
import { RolesField } from './RolesField';

/** Adds a person by e-mail; they choose their own password. */
export function InviteDialog({ onClose }: { onClose: () => void }) {
  const [email, setEmail] = useState('');
  const [name, setName] = useState('');
  const [roles, setRoles] = useState<Role[]>(['student']);
  const invite = useInviteMutation();
  const announce = useAnnounce();
  const send = () => invite.mutate({ email: email.trim(), name: name.trim(), roles }, { onSuccess: () => { announce('Invitation sent'); onClose(); } });
  const named = ['email', 'name', 'roles'].some((field) => fieldError(invite.error, field));
  return (
    <Dialog open onClose={onClose} title="Invite somebody">
      <Form label="Invitation" onSubmit={send}>
        <Text size="quiet" tone="soft">They get an e-mail with a link, set a password and belong to your school.</Text>
        <TextField label="E-mail" required inputMode="email" autoCapitalize="none" autoComplete="off" value={email} onChange={setEmail} error={fieldError(invite.error, 'email')} />
        <TextField label="Name" optional value={name} onChange={setName} error={fieldError(invite.error, 'name')} maxLength={120} />
        <RolesField value={roles} onChange={setRoles} error={fieldError(invite.error, 'roles')} />
        {invite.error && !named ? <Failed error={invite.error} /> : null}
        <Button label="Send the invitation" submits busy={invite.isPending} />
      </Form>
    </Dialog>
  );
}
