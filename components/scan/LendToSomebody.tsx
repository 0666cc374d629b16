import { useQuery } from '@tanstack/react-query';
import { router } from 'expo-router';
import { useState } from 'react';
import type { Page } from '@shared/api/common';
import type { PersonView } from '@shared/api/people';
import { stale, useApi } from '@/components/api';
import { useStartLoanMutation } from '@/components/lending/queries';
import { Button, Card, Failed, Loading, SelectField, Text } from '@/components/ui';

/** Staff take a kit out for somebody who has no phone at hand. */
export function LendToSomebody({ code }: { code: string }) {
  const api = useApi();
  const [borrowerId, setBorrowerId] = useState('');
  const [missing, setMissing] = useState(false);
  const people = useQuery({
    queryKey: ['people', 'all'],
    queryFn: ({ signal }) => api.get<Page<PersonView>>('/people', { signal, query: { limit: 200 } }),
    staleTime: stale.usual,
  });
  const start = useStartLoanMutation();
  const take = () => {
    setMissing(borrowerId === '');
    if (borrowerId !== '') start.mutate({ code, borrowerId }, { onSuccess: (loan) => router.push(`/loans/${loan.id}`) });
  };
  if (people.isPending) return <Loading label="Fetching the people" />;
  if (people.isError) return <Failed error={people.error} onRetry={() => void people.refetch()} />;
  return (
    <Card title="Take it out for somebody">
      <Text size="quiet" tone="soft">For a student without a phone at hand: you scan the jars with them, they pay on this screen.</Text>
      <SelectField
        label="For whom"
        options={people.data.items.map((person) => ({ value: person.id, label: person.name }))}
        value={borrowerId}
        error={missing && borrowerId === '' ? 'Choose the borrower.' : undefined}
        onChange={setBorrowerId}
      />
      {start.error ? <Failed error={start.error} /> : null}
      <Button kind="secondary" label="Take out for them" busy={start.isPending} onPress={take} />
    </Card>
  );
}
