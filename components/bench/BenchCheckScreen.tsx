import { useLocalSearchParams } from 'expo-router';
import type { BenchStone, BenchView } from '@shared/api/bench';
import { useSession } from '@/components/api';
import { RequireRole } from '@/components/shell';
import { ScanPanel } from '@/components/scan/ScanPanel';
import { useBreakpoints } from '@/components/theme';
import { Card, Failed, LinkButton, Loading, PageFrame, Stack, Text } from '@/components/ui';
import { JarRow } from './JarRow';
import { useBenchJarMutation, useBenchQuery, useOpenBenchMutation } from './queries';
import { StonePanel } from './StonePanel';

/** One check: scan the kit, then each jar, then read stone by stone. Wide screens show the stone beside the list. */
export function BenchCheckScreen() {
  const { loanId, stone: stoneParam } = useLocalSearchParams<{ loanId: string; stone?: string }>();
  const check = useBenchQuery(loanId);
  const { phone } = useBreakpoints();
  const view = check.data;
  const chosen = view?.stones.find((stone) => stone.stoneId === stoneParam) ?? (!phone && view ? nextStone(view) : undefined);
  const panel = view?.opened && chosen ? <StonePanel key={chosen.stoneId} loanId={loanId} view={view} stone={chosen} /> : null;
  return (
    <RequireRole roles={['instructor', 'admin']}>
      <PageFrame
        title={view ? (phone && chosen && panel ? stoneTitle(view, chosen) : checkTitle(view)) : 'Bench check'}
        {...(view ? { eyebrow: `Kit ${view.kitNumber}`, lead: view.neutralTitle } : {})}
        back={phone && panel ? { label: 'All jars', to: `/bench/${loanId}` } : { label: 'Bench', to: '/bench' }}
        {...(panel && !phone ? { aside: panel, asideLabel: 'Stone' } : {})}
      >
        {check.isPending ? <Loading label="Opening the check" /> : null}
        {check.isError ? <Failed error={check.error} onRetry={() => void check.refetch()} /> : null}
        {phone && panel ? panel : null}
        {view && !(phone && panel) ? <CheckBody view={view} chosenId={chosen?.stoneId ?? null} /> : null}
      </PageFrame>
    </RequireRole>
  );
}

/** The stone to go on with: the first that wants this reader. */
export function nextStone(view: BenchView, after?: string): BenchStone | undefined {
  const wanted = view.stones.filter((stone) => stone.step === 'read' || stone.step === 'read_more');
  return wanted.find((stone) => stone.stoneId !== after && stone.step === 'read') ?? wanted.find((stone) => stone.stoneId !== after) ?? wanted[0];
}

/** On a phone the stone fills the page, so that its jar is the page's title. */
function stoneTitle(view: BenchView, stone: BenchStone): string {
  const place = view.stones.findIndex((one) => one.stoneId === stone.stoneId) + 1;
  return `Jar ${stone.slot}, ${place} of ${view.stones.length} stones`;
}

function checkTitle(view: BenchView): string {
  if (!view.opened) return `Scan kit ${view.kitNumber} to begin`;
  const ended = view.stones.filter((stone) => stone.ending !== null).length;
  if (view.state === 'settled') return 'Checked and settled';
  if (view.complete) return 'Every stone has its end';
  if (view.stones.some((stone) => stone.step === 'scan')) return 'Scan each jar';
  return `${ended} of ${view.stones.length} stones settled`;
}

function CheckBody({ view, chosenId }: { view: BenchView; chosenId: string | null }) {
  const { hasRole } = useSession();
  const reads = hasRole('instructor');
  const next = nextStone(view);
  return (
    <Stack gap="lg">
      {reads && view.state !== 'settled' ? <ScanStep view={view} /> : null}
      {!reads && !view.opened ? <Text tone="soft">An instructor begins this check by scanning the kit.</Text> : null}
      {view.opened ? (
        <Card padded={false} title="Jars">
          {view.stones.map((stone, index) => (
            <JarRow key={stone.stoneId} loanId={view.loanId} stone={stone} chosen={stone.stoneId === chosenId} last={index === view.stones.length - 1} />
          ))}
        </Card>
      ) : null}
      {reads && next ? <LinkButton kind="primary" label={`Read jar ${next.slot}`} to={`/bench/${view.loanId}?stone=${next.stoneId}`} /> : null}
    </Stack>
  );
}

function ScanStep({ view }: { view: BenchView }) {
  const open = useOpenBenchMutation(view.loanId);
  const jar = useBenchJarMutation(view.loanId);
  const unseen = view.stones.filter((stone) => stone.benchState === null);
  if (!view.opened) {
    return <ScanPanel prompt={`Point the camera at the label of kit ${view.kitNumber}`} busy={open.isPending} error={open.error} onCode={(code) => open.mutate({ code })} />;
  }
  if (unseen.length === 0) return null;
  return (
    <ScanPanel
      prompt={`Scan each jar. ${view.stones.length - unseen.length} of ${view.stones.length} seen.`}
      busy={jar.isPending}
      error={jar.error}
      onCode={(code) => jar.mutate({ code, state: 'seen' })}
    />
  );
}
