import { useChooseSchool, useSession, useSignOutMutation } from '@/components/api';
import { useTheme, type SchemeChoice } from '@/components/theme';
import { Button } from '@/components/ui/Button';
import { RadioField, SegmentedField } from '@/components/ui/choices';
import { Dialog } from '@/components/ui/Dialog';
import { Stack } from '@/components/ui/layout';
import { Text } from '@/components/ui/Text';

const schemes: readonly { value: SchemeChoice; label: string }[] = [
  { value: 'system', label: 'As the device' },
  { value: 'light', label: 'Light' },
  { value: 'dark', label: 'Darkroom' },
];

/** Who is signed in, in which school, how the app looks, and the way out. */
export function AccountDialog({ open, onClose }: { open: boolean; onClose: () => void }) {
  const { account, memberships, school, roles } = useSession();
  const { choice, choose } = useTheme();
  const chooseSchool = useChooseSchool();
  const signOut = useSignOutMutation();
  return (
    <Dialog open={open} onClose={onClose} title={account?.name ?? 'Your account'}>
      <Stack gap="lg">
        <Stack gap="xxs">
          <Text tone="soft">{account?.email}</Text>
          <Text tone="soft">{school ? `${roles.join(', ')} at ${school.schoolName}` : 'No school yet'}</Text>
        </Stack>
        {memberships.length > 1 ? (
          <RadioField
            label="School"
            value={school?.schoolId ?? ''}
            options={memberships.map((membership) => ({ value: membership.schoolId, label: membership.schoolName, hint: membership.roles.join(', ') }))}
            onChange={(schoolId) => {
              chooseSchool(schoolId);
              onClose();
            }}
          />
        ) : null}
        <SegmentedField label="Look" value={choice} options={schemes} onChange={choose} />
        <Button kind="secondary" label="Sign out" busy={signOut.isPending} onPress={() => signOut.mutate()} />
      </Stack>
    </Dialog>
  );
}
