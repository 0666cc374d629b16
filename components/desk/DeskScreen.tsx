import { useLocalSearchParams } from 'expo-router';
import type { DeskLine, DeskView } from '@shared/api/desk';
import { useSchoolQuery } from '@/components/api';
import { RequireRole } from '@/components/shell';
import { useBreakpoints } from '@/components/theme';
import { Card, DataTable, EmptyState, Failed, formatMoment, LinkButton, Loading, Mono, Money, PageFrame, Row, Stack, StateBadge, Text } from '@/components/ui';
import { DeskLoan } from './DeskLoan';
import { useDeskQuery } from './queries';
import { depositWords, deskSummary, groupBadges, groupTitles } from './words';

const weekday = new Intl.DateTimeFormat('en-GB', { weekday: 'long', timeZone: 'UTC' });

/** What now: one list, the most pressing first, each line with its one next action. */
export function DeskScreen() {
  const desk = useDeskQuery();
  const { loan: loanId } = useLocalSearchParams<{ loan?: string }>();
  const { wide } = useBreakpoints();
  const view = desk.data;
  const chosen = view?.lines.find((line) => line.id === loanId && line.next !== null) ?? view?.lines.find((line) => line.next !== null);
  return (
    <RequireRole roles={['admin', 'instructor']}>
      <PageFrame
        title={view ? `${weekday.format(new Date(`${view.today}T12:00:00Z`))}’s desk` : 'The desk'}
        documentTitle="Desk"
        width="wide"
        {...(view ? { lead: deskSummary(view.counts) } : {})}
        {...(wide && chosen ? { aside: <DeskLoan key={chosen.id} loanId={chosen.id} />, asideLabel: 'Loan' } : {})}
      >
        {desk.isPending ? <Loading label="Laying out the desk" /> : null}
        {desk.isError ? <Failed error={desk.error} onRetry={() => void desk.refetch()} /> : null}
        {view ? <DeskBody view={view} chosenId={wide ? (chosen?.id ?? null) : null} /> : null}
      </PageFrame>
    </RequireRole>
  );
}

function DeskBody({ view, chosenId }: { view: DeskView; chosenId: string | null }) {
  if (view.lines.length === 0) {
    return (
      <EmptyState title="All kits are on the shelf" action={<LinkButton label="See the kits" to="/kits" />}>
        Loans, returns and open questions appear here as they happen.
      </EmptyState>
    );
  }
  const waiting = view.lines.filter((line) => line.next !== null && line.group !== 'out' && line.group !== 'going_out');
  return (
    <Stack gap="lg">
      {waiting.length > 0 ? <FirstThing line={waiting[0] as DeskLine} /> : null}
      <Card padded={false}>
        <DeskTable lines={view.lines} chosenId={chosenId} />
      </Card>
    </Stack>
  );
}

/** The one thing to do first, said in a line with its action. */
function FirstThing({ line }: { line: DeskLine }) {
  return (
    <Card edge={groupBadges[line.group] === 'different' ? 'different' : 'open'}>
      <Row justify="space-between" wrap>
        <Stack gap="xxs">
          <Text strong>{`Kit ${line.kitNumber}: ${groupTitles[line.group].toLowerCase()}`}</Text>
          <Text size="quiet" tone="soft">{`${line.borrower.name}${line.open ? `, ${line.open}` : ''}`}</Text>
        </Stack>
        {line.next ? <LinkButton kind="primary" label={line.next.label} to={line.next.href as '/desk'} /> : null}
      </Row>
    </Card>
  );
}

function DeskTable({ lines, chosenId }: { lines: readonly DeskLine[]; chosenId: string | null }) {
  const school = useSchoolQuery();
  const timeZone = school.data?.timeZone ?? 'UTC';
  return (
    <DataTable
      caption="Open loans"
      rows={lines}
      rowKey={(line) => line.id}
      rowTo={(line) => (chosenId === null ? ((line.next?.href ?? `/loans/${line.id}`) as '/desk') : `/desk?loan=${line.id}`)}
      {...(chosenId === null ? {} : { chosenKey: chosenId })}
      columns={[
        { key: 'kit', header: 'Kit', cell: (line) => <Mono strong>{`Kit ${line.kitNumber}`}</Mono> },
        { key: 'with', header: 'With', cell: (line) => line.borrower.name },
        { key: 'state', header: 'State', cell: (line) => <StateBadge state={groupBadges[line.group]} label={stateWords(line)} /> },
        { key: 'due', header: 'Due', cell: (line) => formatMoment(line.dueAt, { timeZone }) },
        { key: 'deposit', header: 'Deposit', align: 'right', cell: (line) => <Deposit line={line} /> },
      ]}
    />
  );
}

const stateWords = (line: DeskLine): string => line.open || groupTitles[line.group].toLowerCase();

function Deposit({ line }: { line: DeskLine }) {
  if (line.depositMinor === 0) return <Text tone="soft">none</Text>;
  return (
    <Row gap="xs" justify="flex-end">
      <Money amountMinor={line.depositMinor} currency={line.currency} />
      <Text size="quiet" tone="soft">{depositWords[line.depositState]}</Text>
    </Row>
  );
}
