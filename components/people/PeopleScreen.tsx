import { useState } from 'react';
import type { PersonView } from '@shared/api/people';
import { RequireRole } from '@/components/shell';
import { Button, Card, DataTable, Failed, Loading, PageFrame, Stack } from '@/components/ui';
import { ChangePerson } from './ChangePerson';
import { Invitations } from './Invitations';
import { InviteDialog } from './InviteDialog';
import { usePeopleQuery } from './queries';
import { roleLabel } from './RolesField';

/** The people of the school, their roles, and who is invited. */
export function PeopleScreen() {
  const people = usePeopleQuery();
  const [inviting, setInviting] = useState(false);
  const rows = people.data?.pages.flatMap((page) => page.items) ?? [];
  return (
    <RequireRole roles={['admin']}>
      <PageFrame title={people.isSuccess && !people.hasNextPage ? `${rows.length} people` : 'People'} documentTitle="People" width="wide" footer={<Button label="Invite somebody" haspopup="dialog" onPress={() => setInviting(true)} />}>
        {people.isPending ? <Loading label="Fetching the people" /> : null}
        {people.isError ? <Failed error={people.error} onRetry={() => void people.refetch()} /> : null}
        {rows.length > 0 ? <People rows={rows} /> : null}
        {people.hasNextPage ? <Button kind="secondary" label="Show more people" busy={people.isFetchingNextPage} onPress={() => void people.fetchNextPage()} /> : null}
        <Invitations />
        {inviting ? <InviteDialog onClose={() => setInviting(false)} /> : null}
      </PageFrame>
    </RequireRole>
  );
}

function People({ rows }: { rows: readonly PersonView[] }) {
  return (
    <Stack>
      <Card padded={false}>
        <DataTable
          caption="People"
          rows={rows}
          rowKey={(person) => person.id}
          columns={[
            { key: 'name', header: 'Name', cell: (person) => person.name },
            { key: 'email', header: 'E-mail', cell: (person) => person.email },
            { key: 'roles', header: 'Roles', cell: (person) => person.roles.map(roleLabel).join(', ') },
            { key: 'change', header: '', align: 'right', cell: (person) => <ChangePerson person={person} /> },
          ]}
        />
      </Card>
    </Stack>
  );
}
