import type { BrowseKit } from '@shared/api/loans';
import { Card, EmptyState, Failed, formatMoment, formatMoney, LinkButton, List, ListRow, Loading, Mono, PageFrame, StateBadge } from '@/components/ui';
import { useBrowseQuery } from './queries';
import { useClock } from './useClock';

/** Kits to take out, under neutral titles. */
export function BorrowScreen() {
  const browse = useBrowseQuery();
  const kits = browse.data?.items ?? [];
  const free = kits.filter((kit) => kit.available).length;
  return (
    <PageFrame
      title={browse.isSuccess ? (free === 0 ? 'No kit is free just now' : `${free} ${free === 1 ? 'kit is' : 'kits are'} free`) : 'Borrow a kit'}
      documentTitle="Borrow"
      lead="Fetch a kit from the shelf, then scan its label to take it out."
      footer={<LinkButton kind="primary" label="Scan a kit" to="/scan" />}
    >
      {browse.isPending ? <Loading label="Looking along the shelf" /> : null}
      {browse.isError ? <Failed error={browse.error} onRetry={() => void browse.refetch()} /> : null}
      {browse.isSuccess && kits.length === 0 ? <EmptyState title="No kits yet">Your school has not put a kit into lending. Ask the desk.</EmptyState> : null}
      {kits.length > 0 ? <KitList kits={kits} /> : null}
    </PageFrame>
  );
}

function KitList({ kits }: { kits: readonly BrowseKit[] }) {
  const { timeZone } = useClock();
  return (
    <Card padded={false}>
      <List label="Kits">
        {kits.map((kit, index) => (
          <ListRow
            key={kit.id}
            inset
            rule={index < kits.length - 1}
            before={<Mono strong>{kit.number}</Mono>}
            title={kit.neutralTitle}
            detail={`${kit.stoneCount} stones, deposit ${formatMoney(kit.depositMinor, kit.currency)}${kit.available ? `, until ${formatMoment(kit.dueAtIfTakenNow, { timeZone })}` : ''}`}
            after={<StateBadge state={kit.available ? 'same' : 'neutral'} label={kit.available ? 'free' : 'not free'} />}
          />
        ))}
      </List>
    </Card>
  );
}
