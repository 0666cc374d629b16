import { useState } from 'react';
import type { StoneView } from '@shared/api/kits';
import { Card, Notice, Stack, StateBadge, Tabs, Text, useAnnounce } from '@/components/ui';
import { CustodyList } from './CustodyList';
import { IntakeCard } from './IntakeCard';
import { PhotosCard } from './PhotosCard';
import { useStoneChangeMutation } from './queries';
import { RecordCard } from './RecordCard';
import { draftOf } from './stoneDraft';
import { StoneForm } from './StoneForm';
import { standingBadges } from './words';

type Part = 'record' | 'photos' | 'custody' | 'stone';

/** The parts of a stone: record and intake, photos, custody, details. */
export function StoneParts({ stone }: { stone: StoneView }) {
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
