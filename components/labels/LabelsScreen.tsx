import { useState } from 'react';
import { useKitsQuery } from '@/components/catalogue/queries';
import { RequireRole } from '@/components/shell';
import { Button, Card, CheckboxField, EmptyState, Failed, LinkButton, Loading, PageFrame, Stack, Text } from '@/components/ui';
import { SheetForm } from './SheetForm';

/** One sheet for several kits at once. */
export function LabelsScreen() {
  const kits = useKitsQuery({});
  const [chosen, setChosen] = useState<readonly string[]>([]);
  const rows = kits.data?.pages.flatMap((page) => page.items).filter((kit) => kit.place !== 'retired') ?? [];
  const toggle = (id: string, on: boolean) => setChosen((before) => (on ? [...before, id] : before.filter((one) => one !== id)));
  return (
    <RequireRole roles={['instructor', 'admin']}>
      <PageFrame title={chosen.length === 0 ? 'Print labels' : `Labels of ${chosen.length} ${chosen.length === 1 ? 'kit' : 'kits'}`} documentTitle="Labels" lead="The sheet holds the labels that are valid now. New ones are issued on each kit’s own page.">
        {kits.isPending ? <Loading label="Fetching the kits" /> : null}
        {kits.isError ? <Failed error={kits.error} onRetry={() => void kits.refetch()} /> : null}
        {kits.isSuccess && rows.length === 0 ? <EmptyState title="No kits yet" action={<LinkButton label="Add a kit" to="/kits/new" />}>Labels are printed for kits and their jars.</EmptyState> : null}
        {rows.length > 0 ? (
          <Stack gap="lg">
            <Card title="Kits">
              {rows.map((kit) => (
                <CheckboxField key={kit.id} label={`${kit.number} ${kit.title}`} checked={chosen.includes(kit.id)} onChange={(on) => toggle(kit.id, on)} />
              ))}
              {kits.hasNextPage ? <Button kind="quiet" label="Show more kits" busy={kits.isFetchingNextPage} onPress={() => void kits.fetchNextPage()} /> : null}
            </Card>
            <Card title="Sheet">
              {chosen.length === 0 ? <Text tone="soft">Choose at least one kit.</Text> : null}
              <SheetForm kitIds={chosen} />
            </Card>
          </Stack>
        ) : null}
      </PageFrame>
    </RequireRole>
  );
}
