import { Failed, Heading, LinkButton, Loading, Mono, Row, Stack, Text } from '@/components/ui';
import { FigureOfSpecies } from '@/components/ui/FigureOfSpecies';
import { useStoneQuery } from './queries';
import { StoneParts } from './StoneParts';
import { headingName } from './words';

/** A stone of the kit beside the kit's list, where the window is wide enough. */
export function StoneAside({ stoneId }: { stoneId: string }) {
  const stone = useStoneQuery(stoneId);
  if (stone.isPending) return <Loading label="Fetching the stone" />;
  if (stone.isError) return <Failed error={stone.error} onRetry={() => void stone.refetch()} />;
  const { kitNumber, slot, speciesName, species, neutralDescription } = stone.data;
  return (
    <Stack gap="lg">
      <Mono size="quiet" tone="soft">{`Kit ${kitNumber} / ${slot}`}</Mono>
      <Row align="flex-start" gap="lg">
        <FigureOfSpecies species={species} size={76} />
        <Stack gap="xxs" style={{ flex: 1, minWidth: 0 }}>
          <Heading level={2}>{headingName(speciesName)}</Heading>
          <Text tone="soft">{neutralDescription}</Text>
        </Stack>
      </Row>
      <StoneParts key={stoneId} stone={stone.data} />
      <LinkButton label="Open on its own page" to={`/stones/${stoneId}`} />
    </Stack>
  );
}
