import { useClock } from '@/components/lending/useClock';
import { Button, Card, Failed, formatDay, List, ListRow } from '@/components/ui';
import { useInvitationsQuery, useWithdrawMutation } from './queries';
import { roleLabel } from './RolesField';

/** Invitations that nobody has taken up yet. */
export function Invitations() {
  const invitations = useInvitationsQuery();
  const withdraw = useWithdrawMutation();
  const clock = useClock();
  if (invitations.isError) return <Failed error={invitations.error} onRetry={() => void invitations.refetch()} />;
  const rows = invitations.data?.items ?? [];
  if (rows.length === 0) return null;
  return (
    <Card title="Invited" padded={false}>
      <List label="Invitations">
        {rows.map((row, index) => (
          <ListRow
            key={row.id}
            inset
            rule={index < rows.length - 1}
            title={row.name || row.email}
            detail={`${row.email}, ${row.roles.map(roleLabel).join(', ')}, until ${formatDay(row.expiresAt, clock)}`}
            after={<Button kind="quiet" label="Withdraw" accessibleLabel={`Withdraw the invitation of ${row.email}`} busy={withdraw.isPending} onPress={() => withdraw.mutate(row.id)} />}
          />
        ))}
      </List>
      {withdraw.error ? <Failed error={withdraw.error} /> : null}
    </Card>
  );
}
