import { useLocalSearchParams } from 'expo-router';
import { useState } from 'react';
import type { KitView, StoneRow } from '@shared/api/kits';
import { LabelsCard } from '@/components/labels/LabelsCard';
import { RequireRole } from '@/components/shell';
import { useBreakpoints } from '@/components/theme';
import { Card, EmptyState, Failed, LinkButton, List, ListRow, Loading, Money, Mono, PageFrame, Row, Stack, StateBadge, Tabs, Text } from '@/components/ui';
import { FigureOfSpecies } from '@/components/ui/FigureOfSpecies';
import { CustodyList } from './CustodyList';
import { KitSettings } from './KitSettings';
import { useKitQuery } from './queries';
import { summaryOf } from './recordWords';
import { StoneAside } from './StoneAside';
import { headingName, placeBadges, standingBadges } from './words';

type Part = 'stones' | 'labels' | 'custody' | 'kit';

/** One kit: its stones and what their records lack, its labels, its chain of events, its own details. */
export function KitScreen() {
  const { kitId, stone: stoneId } = useLocalSearchParams<{ kitId: string; stone?: string }>();
  const kit = useKitQuery(kitId);
  const { wide } = useBreakpoints();
  const chosen = kit.data?.stones.find((stone) => stone.id === stoneId) ?? kit.data?.stones[0];
  return (
    <RequireRole roles={['instructor', 'admin']}>
      <PageFrame
        title={kit.data?.title ?? 'Kit'}
        {...(kit.data ? { eyebrow: `Kit ${kit.data.number}`, lead: leadFor(kit.data) } : {})}
        {...(wide && chosen ? { aside: <StoneAside stoneId={chosen.id} />, asideLabel: 'Stone' } : {})}
        back={{ label: 'Kits', to: '/kits' }}
      >
        {kit.data ? <StateBadge {...placeBadges[kit.data.place]} /> : null}
        {kit.isPending ? <Loading label="Fetching the kit" /> : null}
        {kit.isError ? <Failed error={kit.error} onRetry={() => void kit.refetch()} /> : null}
        {kit.data ? <KitParts kit={kit.data} chosenId={wide ? (chosen?.id ?? null) : null} /> : null}
      </PageFrame>
    </RequireRole>
  );
}

function leadFor(kit: KitView): string {
  if (kit.standing === 'set_aside') return kit.standingReason || 'Set aside until people decide.';
  if (kit.stones.length === 0) return 'It has no stones yet.';
  if (kit.gapCount > 0) return 'It cannot be lent yet: some records are not complete enough for a verdict.';
  return `Students see it as “${kit.neutralTitle}”.`;
}

function KitParts({ kit, chosenId }: { kit: KitView; chosenId: string | null }) {
  const [part, setPart] = useState<Part>('stones');
  return (
    <Stack gap="lg">
      {kit.openLoanId ? <LinkButton label="Open its loan" to={`/loans/${kit.openLoanId}`} /> : null}
      <Tabs
        label="Parts of the kit"
        value={part}
        onChange={setPart}
        tabs={[{ value: 'stones', label: 'Stones' }, { value: 'labels', label: 'Labels' }, { value: 'custody', label: 'Custody' }, { value: 'kit', label: 'Details' }]}
      >
        {part === 'stones' ? <Stones kit={kit} chosenId={chosenId} /> : null}
        {part === 'labels' ? <LabelsCard kit={kit} /> : null}
        {part === 'custody' ? <CustodyList of={{ kitId: kit.id }} /> : null}
        {part === 'kit' ? <KitSettings kit={kit} /> : null}
      </Tabs>
    </Stack>
  );
}

function Stones({ kit, chosenId }: { kit: KitView; chosenId: string | null }) {
  return (
    <Stack gap="lg">
      {kit.stones.length === 0 ? (
        <EmptyState title="No stones yet">Add each stone with what anyone can see of it; its readings follow at the bench.</EmptyState>
      ) : (
        <Card padded={false}>
          <List label="Stones of the kit">
            {kit.stones.map((stone, index) => (
              <ListRow
                key={stone.id}
                inset
                rule={index < kit.stones.length - 1}
                to={chosenId === null ? `/stones/${stone.id}` : `/kits/${kit.id}?stone=${stone.id}`}
                chosen={stone.id === chosenId}
                before={<FigureOfSpecies species={stone.species} size={44} />}
                title={`${stone.slot} ${headingName(stone.speciesName)}`}
                detail={<StoneDetail stone={stone} />}
                after={<StoneState stone={stone} />}
              />
            ))}
          </List>
        </Card>
      )}
      <LinkButton label="Add a stone" to={`/kits/${kit.id}/new-stone`} />
      <Card>
        <Row justify="space-between"><Text tone="soft">Replacement value</Text><Money amountMinor={kit.replacementValueMinor} currency={kit.currency} /></Row>
        <Row justify="space-between"><Text tone="soft">Deposit by your school’s rule</Text><Money amountMinor={kit.depositMinor} currency={kit.currency} /></Row>
      </Card>
    </Stack>
  );
}

function StoneDetail({ stone }: { stone: StoneRow }) {
  const [gap] = stone.gaps;
  return (
    <Stack gap="xxs">
      <Mono size="quiet">{summaryOf(stone.values)}</Mono>
      {gap ? <Text size="quiet" tone="open">{gap.message}</Text> : null}
    </Stack>
  );
}

function StoneState({ stone }: { stone: StoneRow }) {
  if (stone.standing !== 'in_kit') return <StateBadge {...standingBadges[stone.standing]} />;
  return stone.gaps.length > 0 ? <StateBadge state="open" label={`${stone.gaps.length} to record`} /> : <StateBadge state="same" label="complete" />;
}
