import { useLocalSearchParams } from 'expo-router';
import { RequireRole } from '@/components/shell';
import { Failed, Loading, PageFrame } from '@/components/ui';
import { FigureOfSpecies } from '@/components/ui/FigureOfSpecies';
import { useStoneQuery } from './queries';
import { StoneParts } from './StoneParts';
import { headingName } from './words';

/** One stone: its record with the readings behind it, intake, photos, custody, details. */
export function StoneScreen() {
  const { stoneId } = useLocalSearchParams<{ stoneId: string }>();
  const stone = useStoneQuery(stoneId);
  return (
    <RequireRole roles={['instructor', 'admin']}>
      <PageFrame
        title={stone.data ? headingName(stone.data.speciesName) : 'Stone'}
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
