import { useLocalSearchParams } from 'expo-router';
import { useState } from 'react';
import type { StoneView } from '@shared/api/kits';
import { RequireRole } from '@/components/shell';
import { Card, Failed, Loading, Notice, PageFrame, Stack, StateBadge, Tabs, Text, useAnnounce } from '@/components/ui';
import { FigureOfSpecies } from '@/components/ui/FigureOfSpecies';
import { CustodyList } from './CustodyList';
import { IntakeCard } from './IntakeCard';
import { PhotosCard } from './PhotosCard';
import { useStoneChangeMutation, useStoneQuery } from './queries';
import { RecordCard } from './RecordCard';
import { draftOf } from './stoneDraft';
import { StoneForm } from './StoneForm';
import { standingBadges } from './words';

type Part = 'record' | 'photos' | 'custody' | 'stone';

/** One stone: its record with the readings behind it, intake, photos, custody, details. */
export function StoneScreen() {
  const { stoneId } = useLocalSearchParams<{ stoneId: string }>();
  const stone = useStoneQuery(stoneId);
  return (
    <RequireRole roles={['instructor', 'admin']}>
      <PageFrame
        title={stone.data?.speciesName ?? 'Stone'}
        {...(stone.data
          ? {
              eyebrow: `Kit ${stone.data.kitNumber} / ${stone.data.slot}`,
              lead: stone.data.neutralDescription,
              beside: <FigureOfSpecies species={stone.data.species} size={84} label={`Computed interference figure of ${stone.data.speciesName}`} />,
              back: { label: `Kit ${stone.data.kitNumber}`, to: `/kits/${stone.data.kitId}` as const },
            }
          : { back: { label: 'Kits', to: '/kits' as const } })}
      >
        {stone.isPending ? <Loading label="Fetching the stone" /> : null}
        {stone.isError ? <Failed error={stone.error} onRetry={() => void stone.refetch()} /> : null}
        {stone.data ? <StoneParts stone={stone.data} /> : null}
      </PageFrame>
    </RequireRole>
  );
}

function StoneParts({ stone }: { stone: StoneView }) {
  const [part, setPart] = useState<Part>('record');
  return (
    <Stack gap="lg">
      {stone.standing === 'in_kit' ? null : <StateBadge {...standingBadges[stone.standing]} />}
      {stone.flags.includes('metamict') ? <Notice kind="caution" title="May be weakly radioactive">Wash hands, do not store many together, and ask a qualified person. Follow your lab’s own rules.</Notice> : null}
      <Tabs
        label="Parts of the stone"
        value={part}
        onChange={setPart}
        tabs={[{ value: 'record', label: 'Record' }, { value: 'photos', label: 'Photos' }, { value: 'custody', label: 'Custody' }, { value: 'stone', label: 'Details' }]}
      >
        {part === 'record' ? <Record stone={stone} /> : null}
        {part === 'photos' ? <PhotosCard stone={stone} /> : null}
        {part === 'custody' ? <CustodyList of={{ stoneId: stone.id }} /> : null}
        {part === 'stone' ? <Details stone={stone} /> : null}
      </Tabs>
    </Stack>
  );
}

function Record({ stone }: { stone: StoneView }) {
  return (
    <Stack gap="lg">
      {stone.gaps.length > 0 ? (
        <Notice kind="caution" title="Not complete enough for a verdict">
          {stone.gaps.map((gap) => (
            <Text key={gap.message} size="quiet">{gap.message}</Text>
          ))}
        </Notice>
      ) : null}
      <RecordCard stone={stone} />
      {stone.standing === 'retired' ? null : <IntakeCard key={stone.readings.length} stone={stone} />}
    </Stack>
  );
}

function Details({ stone }: { stone: StoneView }) {
  const change = useStoneChangeMutation(stone.id);
  const announce = useAnnounce();
  return (
    <Card title="Details">
      <StoneForm
        key={stone.version}
        initial={draftOf(stone)}
        currency={stone.currency}
        submitLabel="Save"
        busy={change.isPending}
        error={change.error}
        onSubmit={(fields) => change.mutate({ ...fields, version: stone.version }, { onSuccess: () => announce('Saved') })}
      />
    </Card>
  );
}
