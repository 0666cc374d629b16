import { useEffect, useRef } from 'react';
import type { Text as NativeText } from 'react-native';
import type { BenchStone, BenchView } from '@shared/api/bench';
import { useSession } from '@/components/api';
import { headingName } from '@/components/catalogue/words';
import { ReadingForm } from '@/components/readings/ReadingForm';
import { useInstrumentsQuery } from '@/components/readings/instruments';
import { Card, Failed, Heading, LinkButton, Loading, Notice, Row, Stack, StateBadge, Text, useAnnounce } from '@/components/ui';
import { FigureOfSpecies } from '@/components/ui/FigureOfSpecies';
import { nextStone } from './BenchCheckScreen';
import { NoteJar } from './JarRow';
import { OpenedRecord } from './OpenedRecord';
import { useBenchReadingsMutation } from './queries';
import { StoneActions } from './StoneActions';
import { stoneBadge, verdictBadge } from './words';

/** One stone of a check: entry first, blind; then the record, the verdict and what to do next. */
export function StonePanel({ loanId, view, stone }: { loanId: string; view: BenchView; stone: BenchStone }) {
  const { hasRole } = useSession();
  const after = nextStone(view, stone.stoneId);
  const heading = useRef<NativeText>(null);
  const opened = stone.opened !== null;
  const wasOpened = useRef(opened);
  // When the record opens, eyes and screen readers start at its head, not where the form was.
  useEffect(() => {
    if (opened && !wasOpened.current) heading.current?.focus();
    wasOpened.current = opened;
  }, [opened]);
  const goesOn = after !== undefined && after.stoneId !== stone.stoneId && stone.step !== 'read' && stone.step !== 'scan';
  const next = goesOn ? <LinkButton kind="primary" label={`Next: jar ${after.slot}`} to={`/bench/${loanId}?stone=${after.stoneId}`} /> : null;
  return (
    <Stack gap="lg">
      <Row align="flex-start" gap="lg">
        {stone.opened ? <FigureOfSpecies species={stone.opened.species} size={76} /> : null}
        <Stack gap="xxs" style={{ flex: 1, minWidth: 0 }}>
          <Heading level={2} focusable ref={heading}>{stone.opened ? `Jar ${stone.slot}: ${headingName(stone.opened.speciesName)}` : `Jar ${stone.slot}`}</Heading>
          <Text tone="soft">{stone.neutralDescription}</Text>
          {stone.marks ? <Text size="quiet" tone="soft">{`Marks: ${stone.marks}`}</Text> : null}
          <StateBadge {...stoneBadge(stone)} />
        </Stack>
      </Row>
      {next}
      {stone.opened ? <OpenedRecord loanId={loanId} stone={stone} opened={stone.opened} /> : null}
      {hasRole('instructor') ? <Entry loanId={loanId} stone={stone} /> : null}
      <StoneActions loanId={loanId} stone={stone} />
    </Stack>
  );
}

function Entry({ loanId, stone }: { loanId: string; stone: BenchStone }) {
  const register = useInstrumentsQuery();
  const hand = useBenchReadingsMutation(loanId, stone.stoneId);
  const announce = useAnnounce();
  if (stone.step === 'scan') return <WaitForScan loanId={loanId} stone={stone} />;
  const first = stone.step === 'read';
  const own = stone.opened !== null && stone.ending === null && (stone.benchState === 'seen' || stone.benchState === 'damaged');
  if (!first && !own) return null;
  if (register.isPending) return <Loading label="Fetching the instruments" />;
  if (register.isError) return <Failed error={register.error} onRetry={() => void register.refetch()} />;
  const proposed = stone.opened?.verdicts.at(-1)?.result.next[0]?.attribute;
  return (
    <Card title={first ? 'Your readings' : 'Add a reading'}>
      <Text size="quiet" tone="soft">
        {first ? 'Enter what you read. The record and the verdict open once this is handed in; readings stay and are never replaced.' : 'Repeats add and never replace: put the stone on afresh.'}
      </Text>
      <ReadingForm
        key={`${stone.stoneId}/${stone.opened?.readings.length ?? 0}`}
        attributes={first ? stone.suggested : proposed ? [proposed] : []}
        flags={stone.flags}
        register={register.data}
        submitLabel={first ? `Hand in jar ${stone.slot}` : 'Hand in'}
        busy={hand.isPending}
        error={hand.error}
        onSubmit={(readings) =>
          hand.mutate({ readings }, {
            onSuccess: (answer) => {
              const now = answer.stones.find((one) => one.stoneId === stone.stoneId);
              const verdict = now?.opened?.verdicts.at(-1);
              if (verdict) announce(`Jar ${stone.slot}: ${verdictBadge[verdict.verdict].label}`);
            },
          })
        }
      />
    </Card>
  );
}

function WaitForScan({ loanId, stone }: { loanId: string; stone: BenchStone }) {
  return (
    <Notice kind="info" title={`Scan jar ${stone.slot} first`}>
      <Text size="quiet">Its readings can be entered once the jar has been seen in this check.</Text>
      <NoteJar loanId={loanId} stone={stone} />
    </Notice>
  );
}
