import { useState } from 'react';
import type { PersonView } from '@shared/api/people';
import { fieldError } from '@/components/api';
import { Button, Dialog, Failed, Stack, Text } from '@/components/ui';
import { useChangeRolesMutation, useEndMembershipMutation } from './queries';
import { RolesField } from './RolesField';

/** Roles of one person, and the end of their membership. */
export function ChangePerson({ person }: { person: PersonView }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button kind="quiet" label="Change" accessibleLabel={`Change ${person.name}`} haspopup="dialog" onPress={() => setOpen(true)} />
      {open ? <PersonDialog person={person} onClose={() => setOpen(false)} /> : null}
    </>
  );
}

function PersonDialog({ person, onClose }: { person: PersonView; onClose: () => void }) {
  const [roles, setRoles] = useState(person.roles);
  const [ending, setEnding] = useState(false);
  const change = useChangeRolesMutation(person.id);
  const end = useEndMembershipMutation(person.id);
  const failure = end.error ?? (fieldError(change.error, 'roles') ? null : change.error);
  return (
    <Dialog open onClose={onClose} title={person.name} action={<Button label="Save" busy={change.isPending} onPress={() => change.mutate({ roles }, { onSuccess: onClose })} />}>
      <Stack gap="lg">
        <RolesField value={roles} onChange={setRoles} error={fieldError(change.error, 'roles')} />
        {ending ? (
          <Stack>
            <Text>They can no longer sign in to this school. Their loans and money stay on record.</Text>
            <Button kind="danger" label={`End the membership of ${person.name}`} busy={end.isPending} onPress={() => end.mutate(undefined, { onSuccess: onClose })} />
          </Stack>
        ) : (
          <Button kind="quiet" label="End the membership" onPress={() => setEnding(true)} />
        )}
        {failure ? <Failed error={failure} /> : null}
      </Stack>
    </Dialog>
  );
}
