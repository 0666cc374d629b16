import { useDeferredValue, useState } from 'react';
import type { KitPlace, KitRow } from '@shared/api/kits';
import { RequireRole } from '@/components/shell';
import { Button, Card, EmptyState, Failed, LinkButton, List, ListRow, Loading, Mono, PageFrame, SelectField, Stack, StateBadge, TextField } from '@/components/ui';
import { useKitsQuery } from './queries';
import { placeBadges } from './words';

const places = (Object.keys(placeBadges) as KitPlace[]).map((value) => ({ value, label: placeBadges[value].label }));

/** The catalogue of kits: search by number, title or label code, and by where a kit is. */
export function KitsScreen() {
  const [q, setQ] = useState('');
  const [place, setPlace] = useState<KitPlace | '' | 'anywhere'>('anywhere');
  const filter = { q: useDeferredValue(q.trim()), place: place === 'anywhere' ? ('' as const) : place };
  const kits = useKitsQuery(filter);
  const rows = kits.data?.pages.flatMap((page) => page.items) ?? [];
  const filtered = filter.q !== '' || filter.place !== '';
  return (
    <RequireRole roles={['instructor', 'admin']}>
      <PageFrame title={kits.isSuccess && !filtered ? titleFor(rows, kits.hasNextPage) : 'Kits'} documentTitle="Kits" lead="Each stone with what is measured of it. A kit can be lent when every record can carry a verdict." footer={<LinkButton kind="primary" label="Add a kit" to="/kits/new" />}>
        <Stack gap="md">
          <TextField label="Find a kit" hint="Number, title or label code" value={q} onChange={setQ} autoComplete="off" />
          <SelectField label="Where it is" options={[{ value: 'anywhere', label: 'anywhere' }, ...places]} value={place} onChange={setPlace} />
        </Stack>
        {kits.isPending ? <Loading label="Fetching the kits" /> : null}
        {kits.isError ? <Failed error={kits.error} onRetry={() => void kits.refetch()} /> : null}
        {kits.isSuccess && rows.length === 0 ? <NoKits filtered={filtered} /> : null}
        {rows.length > 0 ? <KitList rows={rows} /> : null}
        {kits.hasNextPage ? <Button kind="secondary" label="Show more kits" busy={kits.isFetchingNextPage} onPress={() => void kits.fetchNextPage()} /> : null}
      </PageFrame>
    </RequireRole>
  );
}

function titleFor(rows: readonly KitRow[], more: boolean): string {
  const free = rows.filter((kit) => kit.place === 'shelf').length;
  return more ? 'The kits' : `${rows.length} ${rows.length === 1 ? 'kit' : 'kits'}, ${free} on the shelf`;
}

function NoKits({ filtered }: { filtered: boolean }) {
  return filtered ? (
    <EmptyState title="No kit fits">Change the search, or show kits anywhere.</EmptyState>
  ) : (
    <EmptyState title="No kits yet">Add the first kit, then its stones, then their readings at the bench, then print its labels.</EmptyState>
  );
}

function KitList({ rows }: { rows: readonly KitRow[] }) {
  return (
    <Card padded={false}>
      <List label="Kits">
        {rows.map((kit, index) => (
          <ListRow
            key={kit.id}
            inset
            rule={index < rows.length - 1}
            to={`/kits/${kit.id}`}
            before={<Mono strong>{kit.number}</Mono>}
            title={kit.title}
            detail={`${kit.stoneCount} ${kit.stoneCount === 1 ? 'stone' : 'stones'}${kit.gapCount > 0 ? `, ${kit.gapCount} to record` : ''}`}
            after={<StateBadge {...placeBadges[kit.place]} />}
          />
        ))}
      </List>
    </Card>
  );
}
